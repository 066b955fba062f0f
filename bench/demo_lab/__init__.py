"""The monitor runs of the invented demonstration lab, drawn from a table of true values with a fixed seed."""
