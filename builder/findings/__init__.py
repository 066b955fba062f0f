"""What is computed from checked records: plans, safety, upkeep."""
