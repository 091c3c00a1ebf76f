"""The command `feedpoint`: its subcommands, and the one place that turns a refusal into a line and an exit code."""

import os
import sys
from io import TextIOWrapper
from typing import Annotated

import typer

from feedpoint.cli.carry import deembed, embed
from feedpoint.cli.inspect import inspect
from feedpoint.errors import FeedpointError, WrongUsage

WRONG_USAGE, REFUSED, INTERRUPTED = 2, 3, 130

app = typer.Typer(
    name="feedpoint",
    help="The impedance at the antenna terminals, from a sweep taken at the equipment end of the coax run.",
    epilog="Exit codes: 0 done, 2 wrong usage, 3 input refused, 4 with --strict where a finding is an error.",
    no_args_is_help=True,
    add_completion=False,
    # Plain help and error texts: they read the same in a log, and need 40 ms less than drawn ones.
    rich_markup_mode=None,
    pretty_exceptions_enable=False,
)
app.command()(inspect)
app.command()(deembed)
app.command()(embed)


def _show_version(wanted: bool) -> None:
    if wanted:
        from importlib.metadata import version

        typer.echo(f"feedpoint {version('feedpoint')}")
        raise typer.Exit


@app.callback()
def _common(
    version: Annotated[
        bool, typer.Option("--version", callback=_show_version, is_eager=True, help="Show the version and exit.")
    ] = False,
) -> None:
    pass


def main() -> None:
    """Run the command; a refusal is one line on stderr, never a traceback."""
    # Nobody else's package has a say in how a run sheet is read; looking for such plugins takes 15 ms besides.
    os.environ["PYDANTIC_DISABLE_PLUGINS"] = "__all__"
    for stream in (sys.stdout, sys.stderr):
        # A file name or comment may hold what the terminal's encoding does not.
        if isinstance(stream, TextIOWrapper):
            stream.reconfigure(errors="backslashreplace")
    try:
        app()
    except FeedpointError as refusal:
        print(f"feedpoint: {refusal}", file=sys.stderr)
        sys.exit(WRONG_USAGE if isinstance(refusal, WrongUsage) else REFUSED)
    except KeyboardInterrupt:
        sys.exit(INTERRUPTED)
    except BrokenPipeError:
        # Whoever read our output (head, a pager) has enough. Python would complain once more when it flushes at exit.
        os.dup2(os.open(os.devnull, os.O_WRONLY), sys.stdout.fileno())
        sys.exit(1)
