"""
M. N. O. Sadiku, *Elements of Electromagnetics*, Oxford University Press, chapter 11: examples 11.1, 11.2, 11.3,
practice exercise 11.2 and problem 11.24.

Data and answers of the examples and the exercise from memory, reproduced numerically (the mid-line current of example
11.3 with less certainty: see there). Problem 11.24: data printed in a stored extract (signs garbled there), answer
computed here with 40-digit arithmetic.
"""

from math import log, pi

import numpy as np
import pytest

from feedpoint.line.chain import line_chain
from tests.published.lines import (
    carried_to_shack,
    degrees,
    input_ohm,
    line_of_constants,
    line_of_propagation,
    load_ohm,
    propagation_of,
)
from tests.published.printed import printed

# Example 11.3: 2 m, 8 dB/m, 1 rad/m, Z0 60 + j40, load 20 + j50; 10 V behind 40 ohm.
GAMMA = 8.0 * log(10.0) / 20.0 + 1j
LINE_OHM = 60 + 40j
LOAD_OHM = 20 + 50j
PRINTED_INPUT_OHM = 60.25 + 38.79j


def test_example_11_3_input_impedance():
    impedance = input_ohm(LOAD_OHM, line_of_propagation(GAMMA, LINE_OHM, 2.0))
    assert impedance.real == printed("60.25")
    assert impedance.imag == printed("38.79")


def test_example_11_3_load_is_recovered_from_the_printed_input_impedance():
    # Known to 0.005 ohm in each part; behind 16 dB one way |dZ_load/dZ_in| = 27.9, so 27.9 * 0.005 * sqrt(2) = 0.2 ohm.
    assert load_ohm(PRINTED_INPUT_OHM, line_of_propagation(GAMMA, LINE_OHM, 2.0)) == pytest.approx(LOAD_OHM, abs=0.2)


def test_example_11_3_through_the_chain_itself():
    # The same without the way by line constants: the chain takes the printed gamma and Z0 as they stand.
    chain = line_chain(np.array([2.0 * GAMMA]), np.array([LINE_OHM]))
    voltage, current = chain.towards_shack(np.array([LOAD_OHM]), np.array([1.0 + 0j]))
    assert (voltage / current)[0].real == printed("60.25")
    assert (voltage / current)[0].imag == printed("38.79")


def test_example_11_3_currents():
    half = line_of_propagation(GAMMA, LINE_OHM, 1.0)
    result = carried_to_shack(LOAD_OHM, half, half)
    current = result.planes.current[:, 0] * 10.0 / (40.0 * result.planes.current[0, 0] + result.planes.voltage[0, 0])
    assert 1e3 * abs(current[0]) == printed("93.03")
    assert degrees(current[0]) == printed("-21.15")
    # At the middle the book prints 35.10 mA at 281 degrees, from rounded intermediate values: 40-digit arithmetic gives
    # 34.9174 mA at 280.9224 degrees. Only the angle of the book can be a limit.
    assert degrees(current[1]) % 360.0 == printed("281")
    assert 1e3 * abs(current[1]) == printed("34.9174")
    assert degrees(current[1]) % 360.0 == printed("280.9224")


def test_example_11_1_constants_of_an_air_line():
    # 334.2 nH/m and 68.2 pF/m at 100 MHz belong to 70 ohm and 3 rad/m. They are known to 0.015 % and 0.073 %, and each
    # enters with its root: 0.044 %.
    gamma, z0 = propagation_of(line_of_constants(0.0, 334.2e-9, 0.0, 68.2e-12, 1.0, 100e6), 100e6)
    assert z0 == pytest.approx(70.0, rel=4.5e-4)
    assert gamma.imag == pytest.approx(3.0, rel=4.5e-4)
    assert gamma.real == 0.0


def test_example_11_2_distortionless_line():
    # 1.2 ohm, 333 nH, 333 uS, 92.59 pF per metre at 100 MHz belong to 60 ohm, 20 mNp/m, 0.6 c and 1.8 m. R is known to
    # 4 %, but the others fix it: without distortion R = L G/C. L and G are known to 0.15 %, C to 0.005 %.
    r = 333e-9 * 333e-6 / 92.59e-12
    assert r == printed("1.2")
    gamma, z0 = propagation_of(line_of_constants(r, 333e-9, 333e-6, 92.59e-12, 1.0, 100e6), 100e6)
    assert z0 == pytest.approx(60.0, rel=0.8e-3)
    assert gamma.real == pytest.approx(0.020, rel=2.3e-3)  # G sqrt(L/C)
    # The velocity to half of L's 0.15 %, and the book takes c = 3e8 m/s (0.07 %) for 0.6 c.
    assert 2.0 * pi / gamma.imag == pytest.approx(1.8, rel=1.5e-3)


def test_practice_exercise_11_2_distortionless_line():
    # 80 ohm, 0.04 Np/m, 1.5 rad/m at 500 MHz: 3.2 ohm, 38.2 nH, 500 uS, 5.97 pF per metre. R and G exact, L known to
    # 0.13 %, C to 0.084 %: half of their sum, 0.11 %, of impedance and phase. The loss (R/Z0 + G Z0)/2 is less
    # sensitive.
    gamma, z0 = propagation_of(line_of_constants(3.2, 38.2e-9, 5e-4, 5.97e-12, 1.0, 500e6), 500e6)
    assert z0 == pytest.approx(80.0, rel=1.1e-3)
    assert gamma.imag == pytest.approx(1.5, rel=1.1e-3)
    assert gamma.real == pytest.approx(0.04, rel=1e-5)


# Problem 11.24: 2.1 m, Z0 80 + j60 ohm; a short shows 30 - j12 ohm. (The answer's root is the one half a turn further
# than the principal one. Its series resistance is negative: the numbers are a textbook's, no cable's.)
PROBLEM_11_24 = line_of_propagation(0.0748054 + 1.364484j, 80 + 60j, 2.1)


def test_problem_11_24_short_circuit():
    # 0.0748054 is known to 5e-8 and 1.364484 to 5e-7: 1.06e-6 of the argument; |Z0 (1 - (Zin/Z0)^2)| is 103 ohm.
    assert input_ohm(0.0, PROBLEM_11_24) == pytest.approx(30 - 12j, abs=1.1e-4)


def test_problem_11_24_terminated():
    # |dZin/d(gamma l)| is less than 103 ohm for this load, which lies nearer to Z0; the answer has five decimals.
    assert input_ohm(40 + 30j, PROBLEM_11_24) == pytest.approx(61.46554 + 24.43011j, abs=1.1e-4)

