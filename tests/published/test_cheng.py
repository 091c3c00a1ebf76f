"""
D. K. Cheng, *Field and Wave Electromagnetics*, 2nd edition, Addison-Wesley 1989, chapter 9: example 9-3, problems 9-9
and 9-16, and an example of a line measured open and shorted (its number is not known).

Data of the open-and-short example printed in a stored extract, its answers from memory; example 9-3 and problem 9-9
from memory; all reproduced numerically. Problem 9-16: data from memory, answer computed here with 40-digit arithmetic.
"""

from math import atan, pi, sqrt

import pytest

from tests.published.lines import (
    carried_to_shack,
    input_ohm,
    line_of_constants,
    line_of_propagation,
    lossless_line,
    propagation_of,
)
from tests.published.printed import printed

OPEN_OHM, SHORT_OHM = -54.6, 103.0  # reactances at 1.5 m, less than a quarter wave
LINE_OHM = sqrt(-OPEN_OHM * SHORT_OHM)
PHASE_RAD = atan(sqrt(SHORT_OHM / -OPEN_OHM))


def line_as_measured(length_m):
    return lossless_line(LINE_OHM, PHASE_RAD * length_m / 1.5 / (2.0 * pi))


def test_open_and_short_answers():
    assert printed("75") == LINE_OHM
    assert printed("0.628") == PHASE_RAD / 1.5


@pytest.mark.parametrize(("end_ohm", "measured_ohm"), [(0.0, SHORT_OHM), (complex("inf"), OPEN_OHM)])
def test_open_and_short_line_shows_what_was_measured(end_ohm, measured_ohm):
    # The two data determine the two figures of the line, so this is exact.
    assert input_ohm(end_ohm, line_as_measured(1.5)) == pytest.approx(1j * measured_ohm, abs=1e-9)


def test_open_and_short_twice_the_length():
    impedance = input_ohm(0.0, line_as_measured(3.0))
    assert impedance.real == pytest.approx(0.0, abs=1e-9)
    assert impedance.imag == printed("-232")


def test_open_and_short_quarter_wave():
    # At 2.5 m (known to 0.05: 0.031 rad) a short is nearly an open: more than 75/tan(0.031) = 2400 ohm.
    assert abs(input_ohm(0.0, line_as_measured(2.5))) > 2400.0


def test_example_9_3_distortionless_line():
    # 50 ohm, 0.01 dB/m, 0.1 nF/m: L 0.25 uH, R 0.057 ohm, G 22.8 uS per metre. R is 0.0575 and its last digit was cut,
    # not rounded; G was computed from it. So the loss of the printed constants is too small, by less than 1 in 58.
    line = line_of_constants(0.057, 0.25e-6, 22.8e-6, 0.1e-9, 100.0)
    result = carried_to_shack(50.0, line)
    assert 57.0 / 58.0 < result.columns["matched_loss_db"][0] <= 1.0
    _, z0 = propagation_of(line)
    assert z0 == pytest.approx(50.0, rel=1e-6)


@pytest.mark.parametrize(("length_m", "percent"), [(1000.0, "31.6"), (5000.0, "0.3")])
def test_example_9_3_voltage_that_is_left(length_m, percent):
    # The book takes the 0.01 dB/m for this, not the rounded R.
    line = line_of_propagation(0.01 / 8.685889638 + 3.14j, 50.0, length_m)
    voltage = abs(carried_to_shack(50.0, line).planes.voltage[:, 0])
    assert 100.0 * voltage[1] / voltage[0] == printed(percent)


def test_problem_9_9_constants():
    # 50 ohm, 0.01 dB/m, 0.8 pi rad/m at 100 MHz: L 0.2 uH, C 80 pF, G 23 uS per metre. The printed R is in doubt:
    # computed here, 50 ohm * 0.01 dB/m / 8.686 dB. G is known to 0.5 of 23, and half of the loss is G's: 1.1 %.
    line = line_of_constants(50.0 * 0.01 / 8.685889638, 0.2e-6, 23e-6, 80e-12, 100.0, 100e6)
    gamma, z0 = propagation_of(line, 100e6)
    assert z0 == pytest.approx(50.0, rel=1e-5)
    assert gamma.imag == pytest.approx(0.8 * pi, rel=1e-6)
    columns = carried_to_shack(50.0, line, frequency_hz=100e6).columns
    assert columns["matched_loss_db"][0] == pytest.approx(1.0, rel=0.011)


PROBLEM_9_16 = line_of_propagation(0.0297080 + 1.2721112j, 100.0, 1.5)


def test_problem_9_16_short_circuit():
    # 40 - j280 ohm are the data. The propagation constant is known to 5e-8 in each part, 1.06e-7 of the argument over
    # 1.5 m, and |dZin/d(gamma l)| = |Z0 (1 - (Zin/Z0)^2)| = 896 ohm: 9.5e-5 ohm.
    assert input_ohm(0.0, PROBLEM_9_16) == pytest.approx(40 - 280j, abs=9.5e-5)


def test_problem_9_16_terminated():
    # Printed to 1e-4 ohm; the propagation constant's last digit makes less than 1e-5.
    assert input_ohm(50 + 50j, PROBLEM_9_16) == pytest.approx(62.1951 - 59.7561j, abs=8e-5)
