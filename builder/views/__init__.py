"""Records and findings as frozen views of ready-made text, and the geometry of drawings; no HTML."""
