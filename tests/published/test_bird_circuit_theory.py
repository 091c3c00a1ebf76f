"""
J. O. Bird, *Electrical Circuit Theory and Technology*, chapter 44 (transmission lines): problems 7, 9, 10, 12, 16, 17.

Data printed in a solution collection of a textbook-companion project (608, chapter 44), read in a stored extract (12:
in an extract of a search); answers from memory, reproduced numerically, those of problem 10 with less certainty.

The book's reflection coefficient is that of the current, (Z0 - ZR)/(Z0 + ZR): the negative of ours.
"""

from cmath import phase
from math import degrees, pi

import pytest

from feedpoint.line.reflection import impedance_from_reflection, reflection_from_impedance, swr_from_reflection
from tests.published.lines import line_of_constants, polar, propagation_of
from tests.published.printed import printed


def of_line_per_km(r_ohm, inductance_h, g_s, c_f, frequency_hz):
    """Propagation constant [1/km] and characteristic impedance [ohm] of a line with constants per kilometre."""
    line = line_of_constants(r_ohm / 1e3, inductance_h / 1e3, g_s / 1e3, c_f / 1e3, 1.0, frequency_hz)
    gamma, z0 = propagation_of(line, frequency_hz)
    return 1e3 * gamma, z0


def test_problem_44_7_characteristic_impedance():
    _, z0 = of_line_per_km(15.0, 3.4e-3, 3e-6, 10e-9, 2e3)
    assert abs(z0) == printed("600")
    assert degrees(phase(z0)) == printed("-8.99")


def test_problem_44_9_characteristic_impedance_and_propagation():
    gamma, z0 = of_line_per_km(25.0, 5e-3, 80e-6, 0.04e-6, 1e3)
    assert abs(z0) == printed("390.2")
    assert degrees(phase(z0)) == printed("-10.43")
    assert abs(gamma) == printed("0.1029")
    assert degrees(phase(gamma)) == printed("61.92")
    assert gamma.real == printed("0.0484")
    assert gamma.imag == printed("0.0908")


def test_problem_44_10_characteristic_impedance_propagation_and_wavelength():
    gamma, z0 = of_line_per_km(8.0, 3e-3, 0.25e-6, 7500e-12, 1e3)
    assert abs(z0) == printed("659.2")
    assert degrees(phase(z0)) == printed("-11.3")
    assert abs(gamma) == printed("0.03106")
    assert degrees(phase(gamma)) == printed("78.35")
    assert 2.0 * pi / gamma.imag == printed("206.5")


def test_problem_44_12_distortionless_line():
    # R 80 ohm, G 2 uS, C 5 nF per km without distortion: L = R C/G = 200 mH (the answer), a real Z0.
    gamma, z0 = of_line_per_km(80.0, 200e-3, 2e-6, 5e-9, 1.5e3)
    assert gamma.real == printed("0.0126")
    assert gamma.imag == printed("0.298")
    assert z0.imag == pytest.approx(0.0, abs=1e-9 * z0.real)


def test_problem_44_16_reflection_of_the_current():
    gamma = complex(reflection_from_impedance(400 + 250j, 600.0))
    of_current = -gamma
    assert abs(of_current) == printed("0.31")
    # -65.4 degrees in the book's sense; the voltage's is on the other side of the circle.
    assert degrees(phase(of_current)) == printed("-65.4")
    assert degrees(phase(gamma)) == pytest.approx(180.0 - 65.4, abs=0.05)
    assert swr_from_reflection(gamma) == printed("1.9")


def test_problem_44_17_impedance_from_a_reflection_of_the_current():
    impedance = complex(impedance_from_reflection(-polar(0.2, -120.0), 80.0))
    assert abs(impedance) == printed("97.2")
    assert degrees(phase(impedance)) == printed("19.8")
    assert impedance.real == printed("91.4")
    assert impedance.imag == printed("33.0")
