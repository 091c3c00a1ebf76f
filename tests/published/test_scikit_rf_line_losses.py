"""
The example "Transmission Line Losses" in the documentation of scikit-rf: two lossy lines with a real characteristic
impedance.

The data are printed there (read in a stored extract without its results); the answers are computed here with 40-digit
arithmetic. The first load is +j30 in the text and -j30 in the code of the example: the code's is taken.
"""

from math import pi

import pytest

from tests.published.lines import SPEED_OF_LIGHT, carried_to_shack, line_of_propagation
from tests.published.printed import printed

NEPER = 8.685889638065037  # dB


def test_50_ohm_line_with_200_j30_ohm():
    # 20 m, 1.483 dB/100 m, velocity factor 0.84, 13.56 MHz.
    gamma = 1.483 / 100.0 / NEPER + 2j * pi * 13.56e6 / (0.84 * SPEED_OF_LIGHT)
    line = line_of_propagation(gamma, 50.0, 20.0, 13.56e6)
    result = carried_to_shack(200 - 30j, line, frequency_hz=13.56e6)
    assert abs(result.gamma[0]) == printed("0.607524")
    assert abs(result.planes.gamma[0, 0]) == printed("0.567418")
    assert result.columns["shack_swr"][0] == printed("3.62340")
    assert result.planes.impedance_ohm[0, 0].real == printed("45.07275")
    assert result.planes.impedance_ohm[0, 0].imag == printed("-65.23996")
    assert result.columns["total_loss_db"][0] == printed("0.609424")


def test_75_ohm_line_with_150_ohm():
    # 12 m, 0.02 Np/m, velocity factor 0.67, 250 MHz.
    gamma = 0.02 + 2j * pi * 250e6 / (0.67 * SPEED_OF_LIGHT)
    assert gamma.imag == printed("7.820317")
    line = line_of_propagation(gamma, 75.0, 12.0, 250e6)
    result = carried_to_shack(150.0, line, frequency_hz=250e6, reference_ohm=75.0)
    assert result.planes.impedance_ohm[0, 0].real == printed("94.79805")
    assert result.planes.impedance_ohm[0, 0].imag == printed("29.52483")
    assert abs(result.planes.gamma[0, 0]) == printed("0.206261")
    assert result.columns["matched_loss_db"][0] == pytest.approx(12 * 0.02 * NEPER, rel=1e-9)
