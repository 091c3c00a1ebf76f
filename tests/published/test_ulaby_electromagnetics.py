"""
F. T. Ulaby and U. Ravaioli, *Fundamentals of Applied Electromagnetics*, chapter 2 (Pearson; numbers of the examples
vary by edition): examples 2-1, 2-3, 2-5, 2-6, 2-7 and 2-8.

Data and answers from memory, reproduced numerically. The book takes c = 3e8 m/s; lengths are given in wavelengths here,
so nothing depends on that.
"""

from math import pi

import numpy as np
import pytest

import feedpoint
from feedpoint import Assumed
from feedpoint.line.reflection import reflection_from_impedance, swr_from_reflection
from tests.published.lines import (
    carried_to_antenna,
    carried_to_shack,
    degrees,
    input_ohm,
    line_of_constants,
    lossless_line,
    propagation_of,
)
from tests.published.printed import printed


def test_example_2_1_constants_of_a_lossless_line():
    # 700 MHz, 227 nH/m and 90.9 pF/m belong to 50 ohm and 20 rad/m. The constants are known to 0.22 % and 0.055 %, and
    # each enters with its root: 0.14 % in both answers.
    line = line_of_constants(0.0, 227e-9, 0.0, 90.9e-12, 1.0, 700e6)
    gamma, z0 = propagation_of(line, 700e6)
    assert z0 == pytest.approx(50.0, rel=1.4e-3)
    assert gamma.imag == pytest.approx(20.0, rel=1.4e-3)
    assert gamma.real == 0.0


def test_example_2_3_series_resistor_and_capacitor_on_100_ohm():
    load = feedpoint.LumpedSection("load", "series", resistance_ohm=Assumed(50.0), capacitance_f=Assumed(10e-12))
    result = carried_to_shack(0.0, load, frequency_hz=100e6, reference_ohm=100.0)
    assert abs(result.planes.gamma[0, 0]) == printed("0.76")
    assert degrees(result.planes.gamma[0, 0]) == printed("-60.7")


def test_example_2_5_reflection_and_swr():
    gamma = reflection_from_impedance(np.array([280 + 182j]), 140.0)
    assert abs(gamma[0]) == printed("0.50")
    assert degrees(gamma[0]) == printed("29")
    assert swr_from_reflection(gamma)[0] == printed("3.0")


def test_example_2_6_load_from_swr_and_first_minimum():
    # SWR 3 on 50 ohm, wavelength 0.6 m, first voltage minimum 12 cm from the load.
    result = carried_to_antenna(50.0 / 3.0, lossless_line(50.0, 0.12 / 0.6))
    assert result.impedance_ohm[0].real == printed("85")
    assert result.impedance_ohm[0].imag == printed("-67")


def test_example_2_7_input_impedance_of_3_35_wavelengths():
    # 67 cm at 1.05 GHz and 0.7 c, which is 20 cm a wavelength.
    result = carried_to_shack(100 + 50j, lossless_line(50.0, 3.35))
    assert abs(result.gamma[0]) == printed("0.45")
    assert degrees(result.gamma[0]) == printed("26.6")
    assert result.planes.impedance_ohm[0, 0].real == printed("21.9")
    assert result.planes.impedance_ohm[0, 0].imag == printed("17.4")
    assert result.columns["electrical_length_wavelengths"][0] == pytest.approx(3.35, rel=1e-12)


@pytest.mark.parametrize(
    ("end_ohm", "printed_ohm", "tolerance"),
    [
        # Data, printed to 0.01 ohm; the answers are 70 ohm (known to 0.5: 0.7 % of each) and beta l = 6 pi + pi/6.
        (0.0, 40.42, 0.0072 * 40.42),
        (complex("inf"), -121.24, 0.0072 * 121.24),
    ],
)
def test_example_2_8_open_and_short_of_a_line_of_more_than_three_wavelengths(end_ohm, printed_ohm, tolerance):
    impedance = input_ohm(end_ohm, lossless_line(70.0, (6.0 * pi + pi / 6.0) / (2.0 * pi)))
    assert impedance.real == pytest.approx(0.0, abs=1e-9)
    assert impedance.imag == pytest.approx(printed_ohm, abs=tolerance)
