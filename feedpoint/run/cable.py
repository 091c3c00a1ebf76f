"""
A length of cable: the section that turns and shrinks a reflection.

`two_port` accepts drawn parameters of shape (T, 1) in place of the nominal ones and then yields arrays (T, F).
"""

from dataclasses import dataclass, field
from typing import ClassVar, NamedTuple

import numpy as np

from feedpoint.assumed import Assumed
from feedpoint.line import RealArray, RealLike
from feedpoint.line.chain import line_chain
from feedpoint.line.loss_law import LAW_TEMPERATURE_C, LossLaw
from feedpoint.line.propagation import propagation_and_impedance
from feedpoint.run.sections import Figures, Section, SectionTwoPort, Surroundings
from feedpoint.units import DECIBELS_PER_NEPER, SECONDS_PER_NANOSECOND, SPEED_OF_LIGHT


class CableValues(NamedTuple):
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
class CableSection(Section):
    """
    A length of cable.

    `delay_s` is the one-way high-frequency delay at 20 C where it was stated; it then fixes the phase, the velocity
    factor is length/(c delay), and the length still gives the loss. `cable` is its name in the catalogue.

    Raises
    ------
    RunRefused
        For a length below 0, and a resistance or velocity factor that is not positive.
    """

    kind: ClassVar[str] = "cable"
    name: str
    z0_ohm: Assumed[float]
    velocity_factor: Assumed[float]
    length_m: Assumed[float]
    loss: Assumed[LossLaw]
    delay_s: Assumed[float] | None = None
    delay_tempco_ppm_per_k: Assumed[float] = field(default_factory=lambda: Assumed(0.0, "default"))
    tolerances: CableTolerances = field(default_factory=CableTolerances)
    ratings: Ratings = field(default_factory=Ratings)
    cable: Assumed[str] | None = None

    def __post_init__(self) -> None:
        z0_ohm, velocity_factor, length_m = self.z0_ohm.value, self.velocity_factor.value, self.length_m.value
        self.check(0 < z0_ohm < np.inf, f"z0_ohm is {z0_ohm}; expected more than 0.")
        # Not at most 1, as in a sheet: the formulas hold for a textbook's line whatever its figures are.
        self.check(0 < velocity_factor < np.inf, f"velocity_factor is {velocity_factor}; expected more than 0.")
        self.check(0 <= length_m < np.inf, f"length_m is {length_m}; expected 0 or more.")

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
        terms = {"conductor_loss": law.conductor, "dielectric_loss": law.dielectric, "floor_loss": law.floor}
        described: dict[str, Assumed[float] | Assumed[str]] = {} if self.cable is None else {"cable": self.cable}
        described |= {"length_m": self.length_m, "z0_ohm": self.z0_ohm, "velocity_factor": self.velocity_factor}
        described |= {key: Assumed(float(term), self.loss.origin, self.loss.where) for key, term in terms.items()}
        if self.delay_s is not None:
            delay_ns = self.delay_s.value / SECONDS_PER_NANOSECOND
            described["delay_ns"] = Assumed(delay_ns, self.delay_s.origin, self.delay_s.where)
        if self.delay_tempco_ppm_per_k.value:
            described["delay_tempco_ppm_per_k"] = self.delay_tempco_ppm_per_k
        return described

    def two_port(
        self, frequency_hz: RealArray, surroundings: Surroundings, drawn: CableValues | None = None
    ) -> SectionTwoPort:
        """
        Two-port at frequencies (F,) [Hz], of the nominal figures or of `drawn` ones, at the cable's temperature.

        The delay goes with 1 + tempco (T - 20), by way of the velocity; the loss law sees to its own temperature.
        """
        values = drawn or self.nominal()
        warmer = surroundings.temperature_c - LAW_TEMPERATURE_C
        velocity_factor = values.velocity_factor / (1.0 + values.delay_tempco_ppm_per_k * 1e-6 * warmer)
        gamma, z0 = propagation_and_impedance(
            frequency_hz, values.z0_ohm, velocity_factor, values.loss, surroundings.temperature_c
        )
        propagation = gamma * values.length_m
        loss_db = DECIBELS_PER_NEPER * propagation.real
        return SectionTwoPort(line_chain(propagation, z0), loss_db, propagation.imag / (2.0 * np.pi))


def velocity_factor_of_delay(length_m: float, delay_s: float) -> float:
    """Velocity over c of a line of that length [m] and one-way delay [s]."""
    return length_m / (SPEED_OF_LIGHT * delay_s)
