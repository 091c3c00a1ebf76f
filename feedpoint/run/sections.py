"""
The kinds of section, each of which yields a two-port per frequency.

A section is built once, with every figure resolved (loss points fitted, files read), and knows where each figure came
from. `two_port` accepts drawn parameters of shape (T, 1) in place of the nominal ones and then yields arrays (T, F).
"""

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import NamedTuple, Protocol

import numpy as np

from feedpoint.assumed import Assumed
from feedpoint.line import RealArray, RealLike
from feedpoint.line.chain import (
    Chain,
    line_chain,
    parallel_admittance_s,
    series_chain,
    series_impedance_ohm,
    shunt_chain,
    transformer_chain,
)
from feedpoint.line.loss_law import LAW_TEMPERATURE_C, LossLaw
from feedpoint.line.propagation import propagation_and_impedance
from feedpoint.units import DECIBELS_PER_NEPER, SECONDS_PER_NANOSECOND, SPEED_OF_LIGHT

Figures = Mapping[str, Assumed[float] | Assumed[str]]


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


class Section(Protocol):
    """What every kind of section can do."""

    @property
    def name(self) -> str: ...

    @property
    def kind(self) -> str: ...

    @property
    def cable(self) -> str:
        """Name of the catalogue's cable; empty for everything else."""
        ...

    def figures(self) -> Figures:
        """Every figure that the section stands for, with its origin; keys carry the unit."""
        ...

    def two_port(self, frequency_hz: RealArray, surroundings: Surroundings) -> SectionTwoPort:
        """Two-port at frequencies (F,) [Hz]."""
        ...


@dataclass(frozen=True, eq=False)
class CableValues:
    """
    The figures of a cable that physics sees, each a float or drawn values (T, 1).

    `z0_ohm` and `velocity_factor` are the high-frequency ones, at 20 C; so is the loss law.
    """

    z0_ohm: RealLike
    velocity_factor: RealLike
    length_m: RealLike
    loss: LossLaw
    delay_tempco_ppm_per_k: RealLike = 0.0


class CableTolerances(NamedTuple):
    """Half-widths of rectangular distributions (JCGM 100:2008, 4.3.7); None where nothing was stated."""

    length_m: float | None = None
    velocity_factor: float | None = None
    delay_s: float | None = None
    loss_percent: float | None = None
    z0_ohm: float | None = None
    delay_tempco_ppm_per_k: float | None = None

    @property
    def are_stated(self) -> bool:
        """Whether any tolerance was stated."""
        return self != CableTolerances()


class Ratings(NamedTuple):
    """What the maker allows: rms voltage [V], and power [W] at frequencies [Hz]."""

    max_voltage_rms_v: float | None = None
    max_power_w: tuple[tuple[float, float], ...] = ()


@dataclass(frozen=True, eq=False)
class CableSection:
    """
    A length of cable.

    `delay_s` is the one-way high-frequency delay at 20 C where it was stated; it then fixes the phase, the velocity
    factor is length/(c delay), and the length still gives the loss.
    """

    name: str
    z0_ohm: Assumed[float]
    velocity_factor: Assumed[float]
    length_m: Assumed[float]
    loss: Assumed[LossLaw]
    delay_s: Assumed[float] | None = None
    delay_tempco_ppm_per_k: Assumed[float] = field(default_factory=lambda: Assumed(0.0, "default"))
    tolerances: CableTolerances = field(default_factory=CableTolerances)
    ratings: Ratings = field(default_factory=Ratings)
    cable: str = ""
    kind: str = field(default="cable", init=False)

    def nominal(self) -> CableValues:
        """The figures as described, to be replaced by drawn ones where a trial wants them."""
        return CableValues(
            self.z0_ohm.value,
            self.velocity_factor.value,
            self.length_m.value,
            self.loss.value,
            self.delay_tempco_ppm_per_k.value,
        )

    def figures(self) -> Figures:
        law = self.loss.value
        described: dict[str, Assumed[float] | Assumed[str]] = {
            "length_m": self.length_m,
            "z0_ohm": self.z0_ohm,
            "velocity_factor": self.velocity_factor,
            "conductor_loss": Assumed(float(law.conductor), self.loss.origin, self.loss.where),
            "dielectric_loss": Assumed(float(law.dielectric), self.loss.origin, self.loss.where),
            "floor_loss": Assumed(float(law.floor), self.loss.origin, self.loss.where),
        }
        if self.delay_s is not None:
            delay_ns = self.delay_s.value / SECONDS_PER_NANOSECOND
            described["delay_ns"] = Assumed(delay_ns, self.delay_s.origin, self.delay_s.where)
        if self.delay_tempco_ppm_per_k.value:
            described["delay_tempco_ppm_per_k"] = self.delay_tempco_ppm_per_k
        return described

    def two_port(
        self, frequency_hz: RealArray, surroundings: Surroundings, drawn: CableValues | None = None
    ) -> SectionTwoPort:
        return cable_two_port(frequency_hz, surroundings, drawn or self.nominal())


def cable_two_port(frequency_hz: RealArray, surroundings: Surroundings, values: CableValues) -> SectionTwoPort:
    """
    Two-port of a cable, (F,) or (T, F), at its temperature.

    The delay goes with 1 + tempco (T - 20), by way of the velocity; the loss law sees to its own temperature.
    """
    warmer = surroundings.temperature_c - LAW_TEMPERATURE_C
    velocity_factor = values.velocity_factor / (1.0 + values.delay_tempco_ppm_per_k * 1e-6 * warmer)
    gamma, z0 = propagation_and_impedance(
        frequency_hz, values.z0_ohm, velocity_factor, values.loss, surroundings.temperature_c
    )
    propagation = gamma * values.length_m
    return SectionTwoPort(
        line_chain(propagation, z0), DECIBELS_PER_NEPER * propagation.real, propagation.imag / (2.0 * np.pi)
    )


def velocity_factor_of_delay(length_m: float, delay_s: float) -> float:
    """Velocity over c of a line of that length [m] and one-way delay [s]."""
    return length_m / (SPEED_OF_LIGHT * delay_s)


@dataclass(frozen=True)
class LumpedSection:
    """Resistance [ohm], inductance [H], capacitance [F]: all in series with the run, or all in parallel across it."""

    name: str
    connection: str
    resistance_ohm: float | None = None
    inductance_h: float | None = None
    capacitance_f: float | None = None
    origin: Assumed[str] = field(default_factory=lambda: Assumed("", "call"))
    kind: str = field(default="lumped", init=False)
    cable: str = field(default="", init=False)

    def figures(self) -> Figures:
        values = {
            "resistance_ohm": self.resistance_ohm,
            "inductance_h": self.inductance_h,
            "capacitance_f": self.capacitance_f,
        }
        return {
            f"{self.connection}_{key}": Assumed(value, self.origin.origin, self.origin.where)
            for key, value in values.items()
            if value is not None
        }

    def two_port(self, frequency_hz: RealArray, surroundings: Surroundings) -> SectionTwoPort:
        if self.connection == "series":
            chain = series_chain(
                series_impedance_ohm(
                    frequency_hz, self.resistance_ohm or 0.0, self.inductance_h or 0.0, self.capacitance_f
                )
            )
        else:
            chain = shunt_chain(
                parallel_admittance_s(
                    frequency_hz, self.resistance_ohm, self.inductance_h, self.capacitance_f or 0.0
                )
            )
        return lengthless(chain, frequency_hz, surroundings.reference_ohm)


@dataclass(frozen=True)
class TransformerSection:
    """An ideal transformer; `impedance_ratio` is antenna side : shack side."""

    name: str
    impedance_ratio: Assumed[float]
    kind: str = field(default="transformer", init=False)
    cable: str = field(default="", init=False)

    def figures(self) -> Figures:
        return {"impedance_ratio": self.impedance_ratio}

    def two_port(self, frequency_hz: RealArray, surroundings: Surroundings) -> SectionTwoPort:  # noqa: ARG002
        nothing = np.zeros(frequency_hz.size)
        # Ideal, so it has no loss of its own whatever it is matched to.
        return SectionTwoPort(transformer_chain(self.impedance_ratio.value, frequency_hz.size), nothing, nothing)


def lengthless(chain: Chain, frequency_hz: RealArray, reference_ohm: float) -> SectionTwoPort:
    """Section that has no electrical length of its own and is matched against the sweep's reference."""
    return SectionTwoPort(chain, chain.matched_loss_db(reference_ohm), np.zeros(frequency_hz.size))
