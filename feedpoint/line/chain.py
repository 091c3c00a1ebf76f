"""
Two-ports as chain matrices, and voltage and current carried through them.

A plane is described by its voltage and current together, not by their quotient: nothing is infinite at an open circuit
(the current is exactly 0), and the power that passes the plane is at hand. Port 1 is the side of the shack end.

References
----------
.. [1] D. M. Pozar, *Microwave Engineering*, 4th ed., Wiley 2012, section 4.4 (chain matrix: eq. 4.69, table 4.1,
   conversion from S parameters: table 4.2) and eq. 2.44 (input impedance). Numbers from memory.
"""


from typing import NamedTuple

import numpy as np

from feedpoint.line import ComplexArray, RealArray, RealLike


class Chain(NamedTuple):
    """
    Chain matrix of a two-port per frequency: V1 = a V2 + b I2, I1 = c V2 + d I2, with I2 flowing out of port 2 [1]_.

    The elements are complex arrays that broadcast to (F,) or (T, F); `b` in ohm, `c` in siemens. `determinant` is
    a d - b c, which is 1 for everything reciprocal and known better than the elements give it.
    """

    a: ComplexArray
    b: ComplexArray
    c: ComplexArray
    d: ComplexArray
    determinant: ComplexArray | float = 1.0

    def towards_antenna(self, voltage: ComplexArray, current: ComplexArray) -> tuple[ComplexArray, ComplexArray]:
        """Voltage [V] and current [A] at port 2, from those at port 1."""
        return (
            (self.d * voltage - self.b * current) / self.determinant,
            (self.a * current - self.c * voltage) / self.determinant,
        )

    def towards_shack(self, voltage: ComplexArray, current: ComplexArray) -> tuple[ComplexArray, ComplexArray]:
        """Voltage [V] and current [A] at port 1, from those at port 2."""
        return self.a * voltage + self.b * current, self.c * voltage + self.d * current

    def matched_loss_db(self, reference_ohm: float) -> RealArray:
        """
        Loss between ends matched to `reference_ohm` [dB], 10 log10((1 - |S11|^2)/|S21|^2).

        With x = a + b/R and y = c R + d: S11 = (x - y)/(x + y) and S21 = 2/(x + y), so the quotient is
        (|x + y|^2 - |x - y|^2)/4 = Re(x conj(y)), which does not cancel for small losses. NaN where that is not
        positive: measured two-ports may reflect more than all by a rest of their calibration.
        """
        x = self.a + self.b / reference_ohm
        y = self.c * reference_ohm + self.d
        quotient = np.asarray((x * np.conj(y)).real)
        return 10.0 * np.log10(quotient, out=np.full(quotient.shape, np.nan), where=quotient > 0.0)


def line_chain(propagation: ComplexArray, characteristic_impedance_ohm: ComplexArray) -> Chain:
    """
    Chain of a uniform line, [1]_ table 4.1 with a complex argument.

    Parameters
    ----------
    propagation : complex array (F,) or (T, F)
        gamma * length: one-way attenuation [Np] + j one-way phase [rad].
    characteristic_impedance_ohm : complex array, same shape [ohm]

    Notes
    -----
    cosh and sinh are put together from their real parts: the real functions are several times faster, and sinh keeps
    its full relative accuracy for short lines. Errors of the reflection grow by exp(2 Re propagation) on the way to the
    antenna; that belongs to the problem, whatever form the matrix has.
    """
    attenuation, phase = propagation.real, propagation.imag
    grow, fall = np.cosh(attenuation), np.sinh(attenuation)
    cosine, sine = np.cos(phase), np.sin(phase)
    hyperbolic_cosine = _complex(grow * cosine, fall * sine)
    hyperbolic_sine = _complex(fall * cosine, grow * sine)
    return Chain(
        hyperbolic_cosine,
        characteristic_impedance_ohm * hyperbolic_sine,
        hyperbolic_sine / characteristic_impedance_ohm,
        hyperbolic_cosine,
    )


def series_chain(impedance_ohm: ComplexArray) -> Chain:
    """Chain of an impedance (F,) [ohm] in series with the run, [1]_ table 4.1."""
    one = np.ones_like(impedance_ohm)
    return Chain(one, impedance_ohm, np.zeros_like(one), one)


def shunt_chain(admittance_s: ComplexArray) -> Chain:
    """Chain of an admittance (F,) [S] across the run, [1]_ table 4.1."""
    one = np.ones_like(admittance_s)
    return Chain(one, np.zeros_like(one), admittance_s, one)


def transformer_chain(impedance_ratio: float, points: int) -> Chain:
    """Chain (points,) of an ideal transformer; `impedance_ratio` is antenna side : shack side, [1]_ table 4.1."""
    turns = np.full(points, np.sqrt(impedance_ratio), dtype=complex)
    zero = np.zeros_like(turns)
    return Chain(np.reciprocal(turns), zero, zero, turns)


def scattering_chain(scattering: ComplexArray, reference_1_ohm: float, reference_2_ohm: float) -> Chain:
    """
    Chain of a two-port known by its S parameters.

    Parameters
    ----------
    scattering : complex array (F, 2, 2), S21 not 0
    reference_1_ohm, reference_2_ohm : float > 0 [ohm]
        Reference resistances of the two ports.

    Notes
    -----
    [1]_ table 4.2, written for unequal references; the determinant is S12/S21.
    """
    s11, s12, s21, s22 = (scattering[..., i, j] for i in (0, 1) for j in (0, 1))
    mean = np.sqrt(reference_1_ohm * reference_2_ohm)
    step = np.sqrt(reference_1_ohm / reference_2_ohm)
    through = s12 * s21
    twice = 2.0 * s21
    return Chain(
        ((1.0 + s11) * (1.0 - s22) + through) / twice * step,
        ((1.0 + s11) * (1.0 + s22) - through) / twice * mean,
        ((1.0 - s11) * (1.0 - s22) - through) / twice / mean,
        ((1.0 - s11) * (1.0 + s22) + through) / twice / step,
        s12 / s21,
    )


def series_impedance_ohm(
    frequency_hz: RealArray, resistance_ohm: RealLike, inductance_h: RealLike, capacitance_f: RealLike | None
) -> ComplexArray:
    """Impedance (F,) [ohm] of R, L and C in series; no capacitor where `capacitance_f` is None."""
    angular = 2.0 * np.pi * frequency_hz
    reactance = angular * inductance_h
    if capacitance_f is not None:
        reactance = reactance - 1.0 / (angular * capacitance_f)
    return _complex(np.broadcast_to(resistance_ohm, reactance.shape), reactance)


def parallel_admittance_s(
    frequency_hz: RealArray, resistance_ohm: RealLike | None, inductance_h: RealLike | None, capacitance_f: RealLike
) -> ComplexArray:
    """Admittance (F,) [S] of R, L and C in parallel; no resistor or inductor where it is None."""
    angular = 2.0 * np.pi * frequency_hz
    susceptance = angular * capacitance_f
    if inductance_h is not None:
        susceptance = susceptance - 1.0 / (angular * inductance_h)
    conductance = 0.0 if resistance_ohm is None else 1.0 / resistance_ohm
    return _complex(np.broadcast_to(conductance, susceptance.shape), susceptance)


def _complex(real: RealArray, imaginary: RealArray) -> ComplexArray:
    result = np.empty(np.broadcast(real, imaginary).shape, dtype=complex)
    result.real, result.imag = real, imaginary
    return result
