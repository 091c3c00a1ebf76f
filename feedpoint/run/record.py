"""A run: all that lies between shack end and feed point, with the conditions of the sweep."""

from dataclasses import dataclass, field, replace
from typing import NamedTuple

from feedpoint.assumed import Assumed
from feedpoint.errors import RunRefused
from feedpoint.line import RealArray
from feedpoint.line.loss_law import LAW_TEMPERATURE_C
from feedpoint.run.cable import CableSection
from feedpoint.run.sections import Section, SectionTwoPort, Surroundings
from feedpoint.units import COLDEST_C, HOTTEST_C


class Band(NamedTuple):
    """A band that matters to the user: from `low_hz` to `high_hz` [Hz], with the SWR that is acceptable there."""

    name: str
    low_hz: float
    high_hz: float
    swr_limit: float | None = None


class AnalyzerErrors(NamedTuple):
    """
    Residual errors of the analyzer after its calibration; None where nothing was stated.

    Directivity, source match and tracking in dB (95 % limits), `noise` the standard deviation of each of Re and Im of
    Gamma, `calibration` names the calibration that sweeps may share. `extension_s` is the one-way electrical delay that
    was set when the sweep was saved: it multiplied Gamma by exp(+j 2 w extension).
    """

    directivity_db: float | None = None
    source_match_db: float | None = None
    tracking_db: float | None = None
    noise: float | None = None
    calibration: str | None = None
    extension_s: float = 0.0

    @property
    def is_stated(self) -> bool:
        """Whether any residual error was stated."""
        figures = (self.directivity_db, self.source_match_db, self.tracking_db, self.noise)
        return any(figure is not None for figure in figures)


def _default_temperature() -> Assumed[float]:
    return Assumed(LAW_TEMPERATURE_C, "default")


@dataclass(frozen=True, eq=False)
class Run:
    """
    An ordered chain of sections, first = at the shack end, with the temperature of its cables during the sweep.

    An empty chain is legal: the sweep was taken at the antenna terminals. `files` are those that the run was read from.

    Raises
    ------
    RunRefused
        If the temperature is none that a cable has.
    """

    sections: tuple[Section, ...]
    name: str = "run"
    temperature_c: Assumed[float] = field(default_factory=_default_temperature)
    temperature_tolerance_c: float | None = None
    analyzer: AnalyzerErrors = field(default_factory=AnalyzerErrors)
    bands: tuple[Band, ...] = ()
    source: str = "run"
    files: tuple[str, ...] = ()

    def __post_init__(self) -> None:
        object.__setattr__(self, "sections", tuple(self.sections))
        if not COLDEST_C <= self.temperature_c.value <= HOTTEST_C:
            raise RunRefused(
                f"a cable temperature of {self.temperature_c.value:g} C; expected {COLDEST_C:g} to {HOTTEST_C:g} C.",
                source=self.source,
                key=self.temperature_c.where or "temperature_c",
            )

    def at_temperature(self, temperature_c: float | Assumed[float]) -> "Run":
        """Return the run at another cable temperature [degrees C], which may say whose word it is."""
        stated = temperature_c if isinstance(temperature_c, Assumed) else Assumed(temperature_c)
        return replace(self, temperature_c=stated)

    def with_analyzer(self, analyzer: AnalyzerErrors) -> "Run":
        """Return the run with the errors of another analyzer."""
        return replace(self, analyzer=analyzer)

    def with_bands(self, bands: tuple[Band, ...]) -> "Run":
        """Return the run with more bands."""
        return replace(self, bands=self.bands + bands)

    @property
    def states_tolerances(self) -> bool:
        """Whether any tolerance or analyzer figure was stated, from which an interval could follow."""
        return (
            self.temperature_tolerance_c is not None
            or self.analyzer.is_stated
            or any(section.tolerances.are_stated for section in self.sections if isinstance(section, CableSection))
        )

    def two_ports(self, frequency_hz: RealArray, reference_ohm: float) -> tuple[SectionTwoPort, ...]:
        """Each section's two-port at frequencies (F,) [Hz], at the run's temperature; shack end first."""
        surroundings = Surroundings(self.temperature_c.value, reference_ohm)
        return tuple(section.two_port(frequency_hz, surroundings) for section in self.sections)
