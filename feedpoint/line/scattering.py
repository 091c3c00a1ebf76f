"""
Impedance and admittance matrices as scattering matrices.

References
----------
.. [1] D. M. Pozar, *Microwave Engineering*, 4th ed., Wiley 2012, eq. 4.44-4.45 and section 4.3 (unequal references).
   Equation numbers from memory.
"""

import numpy as np

from feedpoint.line import ComplexArray, RealArray
from feedpoint.line.reflection import reflection_from_impedance


def scattering_from_normalised_impedance(impedance: ComplexArray) -> ComplexArray:
    """
    Scattering matrices (F, n, n) of impedance matrices that are normalised to the references: (z + 1)^-1 (z - 1) [1]_.

    A singular z + 1 gives infinite elements, for the caller to refuse.
    """
    if impedance.shape[-1] == 1:
        return reflection_from_impedance(impedance, 1.0)
    unit = np.eye(impedance.shape[-1], dtype=complex)
    return _solved(impedance + unit, impedance - unit)


def scattering_from_normalised_admittance(admittance: ComplexArray) -> ComplexArray:
    """Scattering matrices (F, n, n) of normalised admittance matrices: (1 + y)^-1 (1 - y) [1]_."""
    if admittance.shape[-1] == 1:
        return -reflection_from_impedance(admittance, 1.0)
    unit = np.eye(admittance.shape[-1], dtype=complex)
    return _solved(unit + admittance, unit - admittance)


def normalised_impedance(impedance_ohm: ComplexArray, reference_ohm: RealArray) -> ComplexArray:
    """Impedance matrices (F, n, n) [ohm] normalised to the references (n,) [ohm] of their ports."""
    return impedance_ohm / _mean_references(reference_ohm)


def normalised_admittance(admittance_s: ComplexArray, reference_ohm: RealArray) -> ComplexArray:
    """Admittance matrices (F, n, n) [S] normalised to the references (n,) [ohm] of their ports."""
    return admittance_s * _mean_references(reference_ohm)


def _mean_references(reference_ohm: RealArray) -> RealArray:
    """Geometric means of the references of every two ports (n, n) [ohm]."""
    means: RealArray = np.sqrt(reference_ohm[:, None] * reference_ohm[None, :])
    return means


def _solved(left: ComplexArray, right: ComplexArray) -> ComplexArray:
    # Beyond this, no digit of the quotient is right.
    singular = np.linalg.cond(left) > 1e15
    result = np.linalg.solve(np.where(singular[:, None, None], np.eye(left.shape[-1]), left), right).astype(complex)
    result[singular] = np.inf
    return result
