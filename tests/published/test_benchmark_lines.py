"""
Lossy lines computed with 40-digit arithmetic (mpmath), from the telegrapher's equations with constants per metre.

No publication: computed here. Five terminations through 30 m, each embedded and de-embedded; the loss of a short line,
which lies below the matched loss where the SWR is 4; and a textbook exercise without a printed answer.
"""

import pytest

from tests.published.lines import (
    DECIBELS_PER_NEPER,
    carried_to_antenna,
    carried_to_shack,
    input_ohm,
    line_of_constants,
    line_of_propagation,
    propagation_of,
    total_loss_db,
)
from tests.published.printed import printed

OPEN = complex("inf")
LINE = line_of_constants(0.5, 250e-9, 10e-6, 100e-12, 30.0)  # 10 MHz

# Load [ohm], impedance at the shack end [ohm], its reflection against 50 ohm, total loss [dB].
BENCHMARK = (
    (73.13 + 42.5j, 69.0696609192566 + 26.8672655625649j, 0.200844407658050 + 0.180324067100700j, "1.679519607"),
    (10 - 200j, 96.8426277494720 - 133.658679251907j, 0.627561979088200 - 0.338999476794940j, "11.67308674"),
    (500 + 0j, 198.235501117860 - 2.66516160717458j, 0.597203164744170 - 0.0043245976340248j, "4.259012266"),
    (0j, 7.81152877804241 - 0.065523614848380j, -0.729756566799 - 0.00196050693452j, None),
    (OPEN, 320.113843810413 - 6.99266325686769j, None, None),
)
# Fourteen digits are stated of each part, and double precision adds a few units of the sixteenth.
RELATIVE = 2e-13
# The last reflection has twelve digits.
LAST_DIGIT = 1e-12


@pytest.mark.parametrize(("load", "shack", "gamma", "loss"), BENCHMARK)
def test_shack_end(load, shack, gamma, loss):
    result = carried_to_shack(load, LINE)
    assert result.planes.impedance_ohm[0, 0] == pytest.approx(shack, rel=RELATIVE)
    if gamma is not None:
        assert result.planes.gamma[0, 0] == pytest.approx(gamma, abs=LAST_DIGIT)
    if loss is not None:
        assert result.columns["total_loss_db"][0] == printed(loss)


@pytest.mark.parametrize(("load", "shack", "loss"), [(load, shack, loss) for load, shack, _, loss in BENCHMARK])
def test_antenna_terminals(load, shack, loss):
    # The reflection grows by exp(2 * 0.157) = 1.37 on the way, and its error with it; as a reflection because an open
    # circuit has no finite ohms.
    result = carried_to_antenna(shack, LINE)
    expected = 1.0 if load == OPEN else (load - 50.0) / (load + 50.0)
    assert result.gamma[0] == pytest.approx(expected, abs=4.0 * RELATIVE)
    if loss is not None:
        assert result.columns["total_loss_db"][0] == pytest.approx(float(loss), rel=1e-9)


def test_propagation_and_characteristic_impedance():
    gamma, z0 = propagation_of(LINE)
    assert gamma.real == printed("0.00524940017977")
    assert gamma.imag == printed("0.314195162619")
    assert z0.real == printed("50.006916246")
    assert z0.imag == printed("-0.755879507785")
    assert 30.0 * gamma.real * DECIBELS_PER_NEPER == printed("1.367871319")
    assert carried_to_shack(50.0, LINE).columns["matched_loss_db"][0] == printed("1.367871319")


SHORT_LINE = line_of_constants(0.3, 250e-9, 1e-6, 100e-12, 1.0)
MATCHED_LOSS_DB = "0.026273638"


@pytest.mark.parametrize(
    ("load", "loss_db"), [(50.0, "0.026200733"), (200.0, "0.010501012"), (12.5, "0.10000421")]
)
def test_total_loss_of_a_short_line(load, loss_db):
    assert total_loss_db(load, SHORT_LINE) == printed(loss_db)


def test_total_loss_of_a_short_line_may_lie_below_its_matched_loss():
    # 200 ohm draws half the current of 50 ohm through the same series resistance.
    result = carried_to_shack(200.0, SHORT_LINE)
    assert result.columns["matched_loss_db"][0] == printed(MATCHED_LOSS_DB)
    assert result.columns["total_loss_db"][0] < result.columns["matched_loss_db"][0]


def test_exercise_with_a_lossy_line_of_negative_reactance():
    # Data printed in a stored extract: 20 m, Z0 50 - j10, load 40 - j20, 0.1 dB/m, 0.05 rad/m; answer computed here.
    line = line_of_propagation(0.1 / DECIBELS_PER_NEPER + 0.05j, 50 - 10j, 20.0)
    impedance = input_ohm(40 - 20j, line)
    assert impedance.real == printed("45.27990")
    assert impedance.imag == printed("-2.29469")
