"""The options that commands share, each defined once."""

from enum import StrEnum
from pathlib import Path
from typing import Annotated, TypeAlias

import typer

from feedpoint.errors import WrongUsage, quoted
from feedpoint.units import (
    parse_frequency_hz,
    parse_frequency_range_hz,
    parse_length_m,
    parse_loss_at,
    parse_number,
    parse_percent,
    parse_resistance_ohm,
    parse_temperature_c,
)


class Format(StrEnum):
    """Forms of output."""

    TABLE = "table"
    CSV = "csv"
    JSON = "json"


def _ratio(text: str) -> float:
    try:
        return parse_number(text)
    except ValueError:
        raise WrongUsage(f"{quoted(text)} is not a number; expected a plain one such as 0.66.") from None


Sweeps: TypeAlias = Annotated[
    list[Path] | None,
    typer.Argument(metavar="SWEEP...", help="Touchstone files (.s1p, .s2p ..., .ts).", show_default=False),
]
OneSweep: TypeAlias = Annotated[Path, typer.Argument(metavar="SWEEP", help="Touchstone file (.s1p, .s2p ..., .ts).")]
Readings: TypeAlias = Annotated[
    list[str] | None,
    typer.Option("--reading", metavar="Z@F", help="Value off a display, e.g. '17.8-22j@14.2MHz' (repeatable)."),
]
Reference: TypeAlias = Annotated[
    float | None,
    typer.Option("--reference", metavar="OHM", parser=parse_resistance_ohm, help="Reference of readings [50]."),
]
Port: TypeAlias = Annotated[
    int | None,
    typer.Option("--port", min=1, help="Port of a file with several, counted from 1."),
]
RunSheet: TypeAlias = Annotated[
    Path | None,
    typer.Option("--run", metavar="SHEET", help="Run sheet (TOML) that describes the coax run."),
]
Cable: TypeAlias = Annotated[
    str | None,
    typer.Option("--cable", metavar="NAME", help="Cable of the catalogue, e.g. RG-213/U."),
]
Length: TypeAlias = Annotated[
    float | None,
    typer.Option("--length", metavar="LENGTH", parser=parse_length_m, help="Its length, e.g. 31.5m or 103ft."),
]
Z0: TypeAlias = Annotated[
    float | None,
    typer.Option("--z0", metavar="OHM", parser=parse_resistance_ohm, help="Its characteristic resistance, e.g. 50ohm."),
]
VelocityFactor: TypeAlias = Annotated[
    float | None,
    typer.Option("--velocity-factor", metavar="V", parser=_ratio, help="Its velocity factor, e.g. 0.66."),
]
LossAt: TypeAlias = Annotated[
    list[str] | None,
    typer.Option("--loss-at", metavar="F:LOSS", help="Its loss at a frequency, e.g. 10MHz:1.3dB/100m (repeatable)."),
]
LengthTolerance: TypeAlias = Annotated[
    float | None,
    typer.Option("--length-tolerance", metavar="LENGTH", parser=parse_length_m, help="Half-width, e.g. 0.1m."),
]
LossTolerance: TypeAlias = Annotated[
    float | None,
    typer.Option("--loss-tolerance", metavar="PERCENT", parser=parse_percent, help="Half-width, e.g. 10%."),
]
VelocityFactorTolerance: TypeAlias = Annotated[
    float | None,
    typer.Option("--velocity-factor-tolerance", metavar="V", parser=_ratio, help="Half-width, e.g. 0.01."),
]
CablesFile: TypeAlias = Annotated[
    Path | None,
    typer.Option("--cables-file", metavar="FILE", help="Catalogue (TOML) with more cables."),
]
Temperature: TypeAlias = Annotated[
    float | None,
    typer.Option("--temperature", metavar="T", parser=parse_temperature_c, help="Of the cable, e.g. 35C or 95F."),
]
Bands: TypeAlias = Annotated[
    list[str] | None,
    typer.Option("--band", metavar="LOW-HIGH", help="Band to look into, e.g. 14.0MHz-14.35MHz (repeatable)."),
]
At: TypeAlias = Annotated[
    list[str] | None,
    typer.Option("--at", metavar="F", help="Row at this frequency, e.g. 14.2MHz (repeatable)."),
]
From: TypeAlias = Annotated[
    float | None,
    typer.Option("--from", metavar="F", parser=parse_frequency_hz, help="Rows from this frequency on."),
]
To: TypeAlias = Annotated[
    float | None,
    typer.Option("--to", metavar="F", parser=parse_frequency_hz, help="Rows up to this frequency."),
]
Every: TypeAlias = Annotated[int | None, typer.Option("--every", metavar="N", min=1, help="Every Nth row.")]
AllRows: TypeAlias = Annotated[bool, typer.Option("--all", help="Every row, also in a table.")]
SwrReference: TypeAlias = Annotated[
    float | None,
    typer.Option(
        "--swr-reference",
        metavar="OHM",
        parser=parse_resistance_ohm,
        help="What SWR and return loss refer to [the sweep's reference].",
    ),
]
OutputFormat: TypeAlias = Annotated[Format | None, typer.Option("--format", help="Form of the output [table].")]
Out: TypeAlias = Annotated[
    Path | None,
    typer.Option("--out", metavar="FILE", help="File for the rows: .csv, .json, or .s1p."),
]
Strict: TypeAlias = Annotated[bool, typer.Option("--strict", help="Exit code 4 where a finding is an error.")]
Quiet: TypeAlias = Annotated[bool, typer.Option("--quiet", help="No findings and no progress on stderr.")]


def loss_points(texts: list[str] | None) -> list[dict[str, float]] | None:
    """Return loss points in the form of a run sheet."""
    if not texts:
        return None
    return [{"mhz": hertz / 1e6, "db_per_100m": loss} for hertz, loss in map(parse_loss_at, texts)]


def frequencies_hz(texts: list[str] | None) -> tuple[float, ...]:
    """Return the frequencies [Hz] of a repeatable option."""
    return tuple(parse_frequency_hz(text) for text in texts or ())


def band_ranges_hz(texts: list[str] | None) -> list[tuple[str, float, float]]:
    """Return text, low and high end [Hz] of each band of a repeatable option."""
    return [(text, *parse_frequency_range_hz(text)) for text in texts or ()]
