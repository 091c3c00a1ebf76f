"""The run that the options of a command describe: a run sheet, or one cable."""

from __future__ import annotations

from typing import TYPE_CHECKING, Any, NamedTuple

from feedpoint.cli.options import band_ranges_hz, loss_points
from feedpoint.errors import WrongUsage

if TYPE_CHECKING:
    from pathlib import Path

    from feedpoint.run.record import Run


# What a cable that is in no catalogue needs.
_NEEDED = ("length_m", "z0_ohm", "velocity_factor", "loss")
_OPTION_OF_KEY = {
    "length_m": "--length",
    "z0_ohm": "--z0",
    "velocity_factor": "--velocity-factor",
    "loss": "--loss-at",
    "length_tolerance_m": "--length-tolerance",
    "loss_tolerance_percent": "--loss-tolerance",
    "velocity_factor_tolerance": "--velocity-factor-tolerance",
}


class CableOptions(NamedTuple):
    """One cable described by options; the fields are named as the keys of a run sheet."""

    cable: str | None
    length_m: float | None
    z0_ohm: float | None
    velocity_factor: float | None
    loss: list[str] | None
    length_tolerance_m: float | None
    loss_tolerance_percent: float | None
    velocity_factor_tolerance: float | None

    def stated(self) -> dict[str, Any]:
        """Return what was stated, under the keys of a section."""
        values = self._asdict() | {"loss": loss_points(self.loss)}
        return {key: value for key, value in values.items() if value is not None}

    def table(self) -> dict[str, Any]:
        """Return the table of a section; empty if nothing was stated, `WrongUsage` if it was too little."""
        table = self.stated()
        needed = _NEEDED[:1] if "cable" in table else _NEEDED
        missing = [_OPTION_OF_KEY[key] for key in needed if key not in table]
        if table and missing:
            raise WrongUsage(f"the run is not fully described; {' and '.join(missing)} missing.")
        return table


class RunOptions(NamedTuple):
    """Everything that a command says about its run."""

    sheet: Path | None
    cable: CableOptions
    cables_file: Path | None
    temperature_c: float | None
    analyzer: Path | None
    bands: list[str] | None

    def run(self) -> Run:
        """
        Return the run.

        Raises
        ------
        WrongUsage
            If neither or both of run sheet and cable are described.
        RunRefused
            If what is described makes no run.
        """
        from feedpoint.assumed import Assumed
        from feedpoint.run.sheet import read_analyzer, read_run_sheet

        if self.sheet is not None and self.cable.stated():
            raise WrongUsage("--run and options that describe a cable contradict each other; use one of them.")
        if self.sheet is not None:
            run = read_run_sheet(self.sheet, cables_file=self.cables_file)
        elif table := self.cable.table():
            run = _run_of_options(table, self.cables_file)
        else:
            raise WrongUsage(
                "the run is not described; use --run SHEET, or --cable NAME --length 31.5m, or --z0, "
                "--velocity-factor, --loss-at and --length."
            )
        if self.temperature_c is not None:
            run = run.at_temperature(Assumed(self.temperature_c, "option", "--temperature"))
        if self.analyzer is not None:
            run = run.with_analyzer(read_analyzer(self.analyzer))
        return run.with_bands(bands_of_options(self.bands))


def _run_of_options(table: dict[str, Any], cables_file: Path | None) -> Run:
    """Return the run of one cable; what its section refuses about an option's value is wrong usage of that option."""
    from feedpoint.errors import RunRefused
    from feedpoint.run.sheet import run_of_section

    try:
        return run_of_section(table, cables_file=cables_file)
    except RunRefused as refusal:
        key = refusal.key.removeprefix("options, ").partition(",")[0]
        if refusal.source or key not in _OPTION_OF_KEY:
            raise
        raise WrongUsage(refusal.message, source=_OPTION_OF_KEY[key]) from None


def bands_of_options(texts: list[str] | None) -> tuple[Any, ...]:
    """Return the bands that `--band` names; each is called as it was written."""
    from feedpoint.run.record import Band

    return tuple(Band(*band) for band in band_ranges_hz(texts))
