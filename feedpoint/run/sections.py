"""
What every section of a run can do, and the sections without a length: lumped elements, ideal transformers.

A section is built once, with every figure resolved (loss points fitted, files read), and knows where each figure came
from. It yields a two-port per frequency; cables and two-port files have modules of their own.
"""

from abc import ABC, abstractmethod
from collections.abc import Mapping
from dataclasses import dataclass
from typing import ClassVar, Literal, NamedTuple

import numpy as np

from feedpoint.assumed import Assumed
from feedpoint.errors import RunRefused
from feedpoint.finding import Finding
from feedpoint.line import RealArray, RealLike
from feedpoint.line.chain import (
    Chain,
    parallel_admittance_s,
    series_chain,
    series_impedance_ohm,
    shunt_chain,
    transformer_chain,
)

Figures = Mapping[str, Assumed[float] | Assumed[str]]
Connection = Literal["series", "shunt"]


class Surroundings(NamedTuple):
    """What a section's two-port depends on beside the section: temperature [degrees C], sweep's reference [ohm]."""

    temperature_c: RealLike
    reference_ohm: float


class SectionTwoPort(NamedTuple):
    """
    One section at the frequencies of a sweep; arrays (F,) or (T, F).

    `matched_loss_db`: loss between matched ends [dB]. `electrical_length`: one-way phase in wavelengths, 0 for what is
    no cable.
    """

    chain: Chain
    matched_loss_db: RealArray
    electrical_length: RealArray


class Section(ABC):
    """One piece of a run."""

    kind: ClassVar[str]
    name: str

    @property
    def findings(self) -> tuple[Finding, ...]:
        """What was noticed about the files that the section was built from."""
        return ()

    @abstractmethod
    def figures(self) -> Figures:
        """Every figure that the section stands for, with its origin; keys carry the unit."""

    @abstractmethod
    def two_port(self, frequency_hz: RealArray, surroundings: Surroundings) -> SectionTwoPort:
        """Two-port at frequencies (F,) [Hz]."""

    def check(self, holds: bool, message: str) -> None:
        """Raise `RunRefused` in the section's name unless a condition holds: what a run sheet checks by its forms."""
        if not holds:
            raise RunRefused(message, source=self.name)


@dataclass(frozen=True)
class LumpedSection(Section):
    """
    Resistance [ohm], inductance [H], capacitance [F]: all in series with the run, or all in parallel across it.

    Raises
    ------
    RunRefused
        For another connection, no element at all, or a value that is negative, or 0 where it would be infinite.
    """

    kind: ClassVar[str] = "lumped"
    name: str
    connection: Connection
    resistance_ohm: Assumed[float] | None = None
    inductance_h: Assumed[float] | None = None
    capacitance_f: Assumed[float] | None = None

    def __post_init__(self) -> None:
        self.check(self.connection in ("series", "shunt"), f"{self.connection!r}; expected 'series' or 'shunt'.")
        self.check(len(self.figures()) > 0, "no element; expected a resistance, inductance or capacitance.")
        may_be_0 = {"series_resistance_ohm", "series_inductance_h", "shunt_capacitance_f"}
        for key, figure in self.figures().items():
            value = float(figure.value)
            possible = 0 < value < np.inf or (value == 0 and key in may_be_0)
            self.check(possible, f"{key} is {value}; expected more than 0.")

    def figures(self) -> Figures:
        elements = {
            "resistance_ohm": self.resistance_ohm,
            "inductance_h": self.inductance_h,
            "capacitance_f": self.capacitance_f,
        }
        return {f"{self.connection}_{key}": figure for key, figure in elements.items() if figure is not None}

    def two_port(self, frequency_hz: RealArray, surroundings: Surroundings) -> SectionTwoPort:
        elements = (self.resistance_ohm, self.inductance_h, self.capacitance_f)
        ohm, henry, farad = (None if element is None else element.value for element in elements)
        if self.connection == "series":
            chain = series_chain(series_impedance_ohm(frequency_hz, ohm or 0.0, henry or 0.0, farad))
        else:
            chain = shunt_chain(parallel_admittance_s(frequency_hz, ohm, henry, farad or 0.0))
        return lengthless(chain, frequency_hz, surroundings.reference_ohm)


@dataclass(frozen=True)
class TransformerSection(Section):
    """An ideal transformer; `impedance_ratio` is antenna side : shack side. `RunRefused` unless it is positive."""

    kind: ClassVar[str] = "transformer"
    name: str
    impedance_ratio: Assumed[float]

    def __post_init__(self) -> None:
        ratio = self.impedance_ratio.value
        self.check(0 < ratio < np.inf, f"impedance_ratio is {ratio}; expected more than 0.")

    def figures(self) -> Figures:
        return {"impedance_ratio": self.impedance_ratio}

    def two_port(self, frequency_hz: RealArray, surroundings: Surroundings) -> SectionTwoPort:  # noqa: ARG002
        nothing = np.zeros(frequency_hz.size)
        # Ideal, so it has no loss of its own whatever it is matched to.
        return SectionTwoPort(transformer_chain(self.impedance_ratio.value, frequency_hz.size), nothing, nothing)


def lengthless(chain: Chain, frequency_hz: RealArray, reference_ohm: float) -> SectionTwoPort:
    """Section that has no electrical length of its own and is matched against the sweep's reference."""
    return SectionTwoPort(chain, chain.matched_loss_db(reference_ohm), np.zeros(frequency_hz.size))
