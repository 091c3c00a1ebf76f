"""`python -m feedpoint` is the command `feedpoint`."""

from feedpoint.cli.app import main

main()
