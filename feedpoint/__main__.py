"""`python -m feedpoint` is the command `feedpoint`."""

from feedpoint.cli.entry import main

main()
