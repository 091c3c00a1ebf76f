"""
Propagation constant and characteristic impedance of a cable, from what a datasheet says about it.

The line constants per metre follow from the high-frequency resistance Z_n, the velocity factor v and the loss law
(a_0, a_c, a_d: attenuation by floor, conductor and dielectric term [Np/m]; beta = w/(v c)):

    R = 2 Z_n (a_0 + a_c)      w L = beta Z_n + 2 Z_n a_c      G = 2 a_d / Z_n      w C = beta / Z_n

The skin effect's internal reactance equals its resistance [1]_, hence the 2 Z_n a_c in w L; the floor, a resistance
that does not come from the skin effect, has none. Then gamma = sqrt((R + jwL)(G + jwC)) and
Zc = sqrt((R + jwL)/(G + jwC)) [2]_. That Zc is complex and that the phase velocity falls towards low frequency are
consequences, not options.

References
----------
.. [1] S. Ramo, J. R. Whinnery, T. Van Duzer, *Fields and Waves in Communication Electronics*, 3rd ed., Wiley 1994,
   section 3.17 (surface impedance R_s (1 + j)). Section number from memory.
.. [2] D. M. Pozar, *Microwave Engineering*, 4th ed., Wiley 2012, eq. 2.5 and 2.7. Equation numbers from memory.
"""

import numpy as np

from feedpoint.line import ComplexArray, RealArray, RealLike
from feedpoint.line.loss_law import DB_PER_100M_PER_NEPER_PER_M, LAW_TEMPERATURE_C, LossLaw
from feedpoint.units import SPEED_OF_LIGHT


def normalised_immittances(
    frequency_hz: RealArray, velocity_factor: RealLike, law: LossLaw, temperature_c: RealLike
) -> tuple[ComplexArray, ComplexArray]:
    """
    Series impedance over Z_n and shunt admittance times Z_n, per metre [1/m], each (F,) or (T, F).

    Parameters
    ----------
    frequency_hz : array, shape (F,) [Hz]
    velocity_factor : float or array (T, 1)
        High-frequency velocity over c, at the temperature of the cable.
    law : LossLaw, at 20 C
    temperature_c : float or array (T, 1) [degrees Celsius]
    """
    conductor, dielectric, floor = law.attenuations(frequency_hz, temperature_c)
    beta = 2.0 * np.pi * frequency_hz / (velocity_factor * SPEED_OF_LIGHT)
    series = 2.0 * (floor + conductor) + 1j * (beta + 2.0 * conductor)
    shunt = 2.0 * dielectric + 1j * beta
    return series, shunt


def propagation_and_impedance(
    frequency_hz: RealArray, z0_ohm: RealLike, velocity_factor: RealLike, law: LossLaw, temperature_c: RealLike
) -> tuple[ComplexArray, ComplexArray]:
    """
    Propagation constant [1/m: Np/m + j rad/m] and complex characteristic impedance [ohm], each (F,) or (T, F).

    Parameters as for `normalised_immittances`, and the high-frequency characteristic resistance `z0_ohm`.
    Both roots lie in the right half plane: series and shunt are in the first quadrant, so the principal root of their
    product is too, and Zc = Z_n series/gamma has the sign that goes with it.
    """
    series, shunt = normalised_immittances(frequency_hz, velocity_factor, law, temperature_c)
    gamma = np.sqrt(series * shunt)
    return gamma, z0_ohm * (series / gamma)


def true_loss_db_per_100m(
    frequency_hz: RealArray, velocity_factor: RealLike, law: LossLaw, temperature_c: RealLike = LAW_TEMPERATURE_C
) -> RealArray:
    """Attenuation between matched ends [dB/100 m], (F,) or (T, F): Re gamma of `propagation_and_impedance`."""
    series, shunt = normalised_immittances(frequency_hz, velocity_factor, law, temperature_c)
    return DB_PER_100M_PER_NEPER_PER_M * np.sqrt(series * shunt).real
