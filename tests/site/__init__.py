"""The shipped records' built site, seen in a real browser."""
