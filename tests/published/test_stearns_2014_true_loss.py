"""
S. Stearns, conference paper on transmission-line loss (ARRL Pacificon 2014), after the feed-line example of the *ARRL
Antenna Book*: 100 ft of 450-ohm-class line at 1.83 MHz, 0.095 dB/100 ft, velocity factor 0.915, R0 402.75 ohm and
X0 = -R0 alpha/beta, terminated by 4.5 - j1673 ohm.

The data are printed in the example "Transmission Line Losses" of scikit-rf, which says that it matches the paper; read
in a stored extract without its results. The answers are computed here with 40-digit arithmetic.

It is the case that separates power from reflection: with a complex characteristic impedance the loss is not what the
two reflection coefficients say.
"""

from math import log10, pi

import pytest

from tests.published.lines import (
    DECIBELS_PER_NEPER,
    SPEED_OF_LIGHT,
    carried_to_antenna,
    carried_to_shack,
    line_of_propagation,
    load_ohm,
    propagation_of,
)
from tests.published.printed import printed

FREQUENCY_HZ = 1.83e6
LENGTH_M = 30.48
ALPHA = 0.095 / DECIBELS_PER_NEPER / LENGTH_M
BETA = 2.0 * pi * FREQUENCY_HZ / (0.915 * SPEED_OF_LIGHT)
LINE_OHM = 402.75 * (1.0 - 1j * ALPHA / BETA)
LOAD_OHM = 4.5 - 1673j
LINE = line_of_propagation(ALPHA + 1j * BETA, LINE_OHM, LENGTH_M, FREQUENCY_HZ)


@pytest.fixture(scope="module")
def result():
    return carried_to_shack(LOAD_OHM, LINE, frequency_hz=FREQUENCY_HZ)


def test_line_is_the_one_of_the_example():
    gamma, z0 = propagation_of(LINE, FREQUENCY_HZ)
    assert gamma.real == pytest.approx(3.58835e-4, abs=0.5e-9)
    assert gamma.imag == printed("0.0419169")
    assert z0.real == pytest.approx(402.75, rel=1e-12)
    assert z0.imag == printed("-3.44779")


def test_input_impedance(result):
    impedance = result.planes.impedance_ohm[0, 0]
    assert impedance.real == printed("5.25688")
    assert impedance.imag == printed("-22.99766")


def test_total_loss_is_the_power_ratio(result):
    assert result.columns["total_loss_db"][0] == printed("13.2754")
    assert result.columns["matched_loss_db"][0] == pytest.approx(0.095, rel=1e-9)


def test_total_loss_is_not_the_shortcut_by_reflections(result):
    shack, antenna = (abs((z - LINE_OHM) / (z + LINE_OHM)) for z in result.planes.impedance_ohm[:, 0])
    assert antenna == printed("0.994893")
    assert shack == printed("0.973367")
    shortcut = 0.095 + 10.0 * log10((1.0 - shack**2) / (1.0 - antenna**2))
    assert shortcut == printed("7.2206")
    assert result.columns["total_loss_db"][0] - shortcut == pytest.approx(13.2754 - 7.2206, abs=1e-4)


def test_deembedding_finds_the_same_loss_and_load():
    # The printed input impedance is known to 5e-6 ohm in each part; the reflection's distance from 1, and the ohms with
    # it, grow on the way: |dZ_load/dZ_in| = |Z_load^2 - Z0^2|/|Z_in^2 - Z0^2| = 18.2 here, 1.3e-4 ohm.
    shack_ohm = 5.25688 - 22.99766j
    assert load_ohm(shack_ohm, LINE, frequency_hz=FREQUENCY_HZ) == pytest.approx(LOAD_OHM, abs=1.3e-4)
    # 1.3e-4 of 4.5 ohm is 1.3e-4 dB.
    result = carried_to_antenna(shack_ohm, LINE, frequency_hz=FREQUENCY_HZ)
    assert result.columns["total_loss_db"][0] == pytest.approx(13.2754, abs=2e-4)


def test_a_real_characteristic_impedance_would_lose_half_a_decibel():
    real = line_of_propagation(ALPHA + 1j * BETA, 402.75 + 0j, LENGTH_M, FREQUENCY_HZ)
    result = carried_to_shack(LOAD_OHM, real, frequency_hz=FREQUENCY_HZ)
    assert result.columns["total_loss_db"][0] == printed("12.7581")
    assert result.planes.impedance_ohm[0, 0].real == printed("4.6664")
    assert result.planes.impedance_ohm[0, 0].imag == printed("-22.9506")
