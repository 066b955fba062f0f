"""`python -m builder` is the command `etchwright`."""

from builder.cli import main

main()
