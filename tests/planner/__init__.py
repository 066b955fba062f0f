"""The planner: its model against the Python engine, its page in a real browser."""
