"""Will a sample survive? Facts gathered from the records, and plans made of those facts alone."""
