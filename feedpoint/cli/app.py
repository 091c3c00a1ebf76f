"""The command `feedpoint` and its subcommands."""

from typing import Annotated

import typer

from feedpoint.cli.carry import deembed, embed
from feedpoint.cli.inspect import inspect

app = typer.Typer(
    name="feedpoint",
    help="The impedance at the antenna terminals, from a sweep taken at the equipment end of the coax run.",
    epilog="Exit codes: 0 done, 2 wrong usage, 3 input refused, 4 with --strict where a finding is an error.",
    no_args_is_help=True,
    context_settings={"help_option_names": ["-h", "--help"]},
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
