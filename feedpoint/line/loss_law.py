"""
The loss law of a cable: three terms, at 20 C, and its temperature dependence.

References
----------
.. [1] S. Ramo, J. R. Whinnery, T. Van Duzer, *Fields and Waves in Communication Electronics*, 3rd ed., Wiley 1994,
   sections 3.16-3.17 and 5.9 (skin effect, low-loss line). Section numbers from memory.
.. [2] IEC 60028:1925, *International standard of resistance for copper*: temperature coefficient of resistance of
   annealed copper at 20 C, 0.00393 per kelvin.
"""

from dataclasses import dataclass, replace

import numpy as np

from feedpoint.line import RealArray, RealLike
from feedpoint.units import DECIBELS_PER_NEPER, HZ_PER_MHZ, METRES_PER_100M

# dB/100 m for an attenuation of 1 Np/m.
DB_PER_100M_PER_NEPER_PER_M = METRES_PER_100M * DECIBELS_PER_NEPER
COPPER_RESISTANCE_PER_K = 0.00393
LAW_TEMPERATURE_C = 20.0


@dataclass(frozen=True, eq=False)
class LossLaw:
    """
    Attenuation of a cable against frequency: floor + conductor sqrt(f) + dielectric f.

    The three terms are in dB/100 m with f in MHz, at 20 C, each a float or an array (T, 1) of drawn values. They are
    the high-frequency asymptote: the true attenuation is the real part of the propagation constant that
    `feedpoint.line.propagation` computes from them, a few per cent lower at the bottom of HF.

    `valid_hz` is the range of the printed points that the terms were fitted to, and `fit_residual` the largest relative
    deviation of the true loss from them; None where the terms were given as such.
    """

    conductor: RealLike
    dielectric: RealLike = 0.0
    floor: RealLike = 0.0
    valid_hz: tuple[float, float] | None = None
    fit_residual: float | None = None

    def scaled(self, factor: RealLike) -> "LossLaw":
        """Return the law with all three terms multiplied by `factor` (float or (T, 1))."""
        return replace(
            self, conductor=self.conductor * factor, dielectric=self.dielectric * factor, floor=self.floor * factor
        )

    def attenuations(self, frequency_hz: RealArray, temperature_c: RealLike) -> tuple[RealArray, RealArray, RealArray]:
        """
        Attenuation by the conductor, the dielectric and the floor term [Np/m], each (F,) or (T, F).

        Conductor term: surface resistance goes with sqrt(f) and with sqrt(resistivity); dielectric term: with f [1]_.
        Floor term: the dc resistance of a thin or plated conductor, so it goes with resistivity itself.
        """
        warmth = resistance_factor(temperature_c)
        megahertz = frequency_hz / HZ_PER_MHZ
        conductor = self.conductor * np.sqrt(warmth) / DB_PER_100M_PER_NEPER_PER_M * np.sqrt(megahertz)
        dielectric = self.dielectric / DB_PER_100M_PER_NEPER_PER_M * megahertz
        floor = self.floor * warmth / DB_PER_100M_PER_NEPER_PER_M * np.ones_like(megahertz)
        return conductor, dielectric, floor


def resistance_factor(temperature_c: RealLike) -> RealLike:
    """
    Resistivity of annealed copper relative to 20 C, 1 + 0.00393 (T - 20) [2]_.

    The skin-effect resistance goes with its square root. Valid for the temperatures that a cable survives.
    """
    return 1.0 + COPPER_RESISTANCE_PER_K * (temperature_c - LAW_TEMPERATURE_C)
