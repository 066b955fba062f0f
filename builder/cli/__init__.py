"""The commands of the program: the only place that prints, and that sets the exit status."""

from builder.cli.commands import main

__all__ = ["main"]
