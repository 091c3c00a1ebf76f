"""The options that commands share, each defined once."""

from collections.abc import Callable
from enum import StrEnum
from pathlib import Path
from typing import Annotated, Any, TypeAlias, TypeVar

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


Parsed = TypeVar("Parsed")


def _named(option: str, parse: Callable[[str], Parsed]) -> Callable[[str], Parsed]:
    """Return `parse` with the option's name in front of its refusals."""

    def parse_option(text: str) -> Parsed:
        try:
            return parse(text)
        except WrongUsage as refusal:
            raise WrongUsage(refusal.message, source=option) from None

    return parse_option


def _quantity(option: str, metavar: str, parse: Callable[[str], float], text: str) -> Any:
    """Return the definition of an option that takes a quantity; `text` is its help."""
    return typer.Option(option, metavar=metavar, parser=_named(option, parse), help=text)


def _ratio(text: str) -> float:
    try:
        return parse_number(text)
    except ValueError:
        raise WrongUsage(f"{quoted(text)} is not a number; expected a plain one such as 0.66.") from None


def _velocity_factor(text: str) -> float:
    ratio = _ratio(text)
    if not 0.0 < ratio <= 1.0:
        raise WrongUsage(f"{quoted(text)} is no share of the velocity of light; expected 0 to 1, such as 0.66.")
    return ratio


def _tolerance(text: str) -> float:
    ratio = _ratio(text)
    if ratio < 0.0:
        raise WrongUsage(f"{quoted(text)}: a tolerance must not be negative.")
    return ratio


Sweeps: TypeAlias = Annotated[
    list[Path] | None,
    typer.Argument(metavar="SWEEP", help="Touchstone files (.s1p, .s2p ..., .ts).", show_default=False),
]
OneSweep: TypeAlias = Annotated[Path, typer.Argument(metavar="SWEEP", help="Touchstone file (.s1p, .s2p ..., .ts).")]
Readings: TypeAlias = Annotated[
    list[str] | None,
    typer.Option("--reading", metavar="Z@F", help="Value off a display, e.g. '17.8-22j@14.2MHz' (repeatable)."),
]
Reference: TypeAlias = Annotated[
    float | None,
    _quantity("--reference", "OHM", parse_resistance_ohm, "Reference of readings [50]."),
]
Port: TypeAlias = Annotated[
    int | None,
    typer.Option("--port", metavar="N", min=1, help="Port of a file with several, counted from 1."),
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
    _quantity("--length", "LENGTH", parse_length_m, "Its length, e.g. 31.5m or 103ft."),
]
Z0: TypeAlias = Annotated[
    float | None,
    _quantity("--z0", "OHM", parse_resistance_ohm, "Its characteristic resistance, e.g. 50ohm."),
]
VelocityFactor: TypeAlias = Annotated[
    float | None,
    _quantity("--velocity-factor", "V", _velocity_factor, "Its velocity factor, e.g. 0.66."),
]
LossAt: TypeAlias = Annotated[
    list[str] | None,
    typer.Option("--loss-at", metavar="F:LOSS", help="Its loss at a frequency, e.g. 10MHz:1.3dB/100m (repeatable)."),
]
LengthTolerance: TypeAlias = Annotated[
    float | None,
    _quantity("--length-tolerance", "LENGTH", parse_length_m, "Half-width, e.g. 0.1m."),
]
LossTolerance: TypeAlias = Annotated[
    float | None,
    _quantity("--loss-tolerance", "PERCENT", parse_percent, "Half-width, e.g. 10%."),
]
VelocityFactorTolerance: TypeAlias = Annotated[
    float | None,
    _quantity("--velocity-factor-tolerance", "V", _tolerance, "Half-width, e.g. 0.01."),
]
CablesFile: TypeAlias = Annotated[
    Path | None,
    typer.Option("--cables-file", metavar="FILE", help="Catalogue (TOML) with more cables."),
]
Temperature: TypeAlias = Annotated[
    float | None,
    _quantity("--temperature", "T", parse_temperature_c, "Of the cable, e.g. 35C or 95F."),
]
Analyzer: TypeAlias = Annotated[
    Path | None,
    typer.Option("--analyzer", metavar="FILE", help="File (TOML) with the [analyzer] of these sweeps."),
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
    _quantity("--from", "F", parse_frequency_hz, "Rows from this frequency on."),
]
To: TypeAlias = Annotated[
    float | None,
    _quantity("--to", "F", parse_frequency_hz, "Rows up to this frequency."),
]
Every: TypeAlias = Annotated[int | None, typer.Option("--every", metavar="N", min=1, help="Every Nth row.")]
AllRows: TypeAlias = Annotated[bool, typer.Option("--all", help="Every row, also in a table.")]
SwrReference: TypeAlias = Annotated[
    float | None,
    _quantity("--swr-reference", "OHM", parse_resistance_ohm, "What SWR and return loss refer to [as the sweep]."),
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
    return [{"mhz": hertz / 1e6, "db_per_100m": loss} for hertz, loss in map(_named("--loss-at", parse_loss_at), texts)]


def frequencies_hz(texts: list[str] | None) -> tuple[float, ...]:
    """Return the frequencies [Hz] of a repeatable option."""
    return tuple(map(_named("--at", parse_frequency_hz), texts or ()))


def band_ranges_hz(texts: list[str] | None) -> list[tuple[str, float, float]]:
    """Return text, low and high end [Hz] of each band of a repeatable option."""
    return [(text, *_named("--band", parse_frequency_range_hz)(text)) for text in texts or ()]
