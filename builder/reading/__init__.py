"""Files to plain data with line numbers: strict YAML, strict CSV, and the folders of a lab."""
