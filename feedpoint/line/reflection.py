"""
Reflection, impedance, SWR and return loss: one and the same quantity in the forms that people read.

Gamma = (Z - R)/(Z + R) with a real reference resistance R. Open and short circuits are exact in both directions: an
infinite impedance is `inf+0j`, never a large number.

References
----------
.. [1] D. M. Pozar, *Microwave Engineering*, 4th ed., Wiley 2012, section 2.3: eq. 2.35 (reflection), 2.38 (return
   loss), 2.41 (SWR). Equation numbers from memory.
"""

from typing import Any

import numpy as np
from numpy.typing import NDArray

from feedpoint.line import ComplexArray, RealArray

OPEN_CIRCUIT_OHM = complex(np.inf, 0.0)
# Relative to the reference; beyond 1e17 the reflection of any impedance rounds to 1, and beyond 1e150 squares overflow.
_AS_GOOD_AS_OPEN = 1e100


def reflection_from_impedance(impedance_ohm: ComplexArray, reference_ohm: float) -> ComplexArray:
    """
    Reflection coefficient of an impedance against a real reference resistance.

    Parameters
    ----------
    impedance_ohm : complex array, any shape [ohm]
        Infinite values (of either part) are open circuits.
    reference_ohm : float > 0 [ohm]

    Returns
    -------
    complex array, same shape. Gamma = (Z - R)/(Z + R), [1]_ eq. 2.35; exactly 1 for an open circuit, and infinite for
    Z = -R.
    """
    impedance_ohm = np.asarray(impedance_ohm, dtype=complex)
    is_open = np.maximum(np.abs(impedance_ohm.real), np.abs(impedance_ohm.imag)) > _AS_GOOD_AS_OPEN * reference_ohm
    finite = np.where(is_open, 0.0, impedance_ohm)
    return np.where(is_open, 1.0, ratio(finite - reference_ohm, finite + reference_ohm))


def impedance_from_reflection(gamma: ComplexArray, reference_ohm: float) -> ComplexArray:
    """
    Impedance [ohm] that shows the reflection `gamma` against `reference_ohm`.

    Z = R (1 + Gamma)/(1 - Gamma), [1]_ eq. 2.35 solved for Z; `inf+0j` where Gamma = 1, and -R for an infinite Gamma.
    Shape as `gamma`.
    """
    gamma = np.asarray(gamma, dtype=complex)
    is_infinite = np.isinf(gamma)
    finite = np.where(is_infinite, 0.0, gamma)
    return np.where(is_infinite, -reference_ohm, ratio(reference_ohm * (1.0 + finite), 1.0 - finite))


def swr_from_reflection(gamma: ComplexArray) -> RealArray:
    """Return the SWR, (1 + |Gamma|)/(1 - |Gamma|), [1]_ eq. 2.41; infinite where |Gamma| >= 1. Shape as `gamma`."""
    magnitude = np.abs(gamma)
    below = magnitude < 1.0
    magnitude = np.where(below, magnitude, 0.0)
    return np.where(below, (1.0 + magnitude) / (1.0 - magnitude), np.inf)


def return_loss_db(gamma: ComplexArray) -> RealArray:
    """
    Return loss [dB], -20 log10 |Gamma|, [1]_ eq. 2.38; infinite at Gamma = 0, 0 or negative where |Gamma| >= 1.

    Shape as `gamma`.
    """
    with np.errstate(divide="ignore"):
        # 0.0 - x rather than -x: full reflection is a return loss of 0 dB, not -0 dB.
        return 0.0 - 20.0 * np.log10(np.abs(gamma))


def ratio(numerator: NDArray[Any], denominator: NDArray[Any]) -> ComplexArray:
    """Quotient of two complex arrays of one shape, `inf+0j` where the denominator is 0 or all but 0."""
    quotient = np.full(np.broadcast(numerator, denominator).shape, OPEN_CIRCUIT_OHM)
    with np.errstate(over="ignore", invalid="ignore"):
        np.divide(numerator, denominator, out=quotient, where=denominator != 0.0)
    quotient[~np.isfinite(quotient)] = OPEN_CIRCUIT_OHM
    return quotient
