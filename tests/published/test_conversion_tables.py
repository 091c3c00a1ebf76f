"""
Conversion tables of SWR, reflection, reflected power, return loss and mismatch loss, as published many times over.

Printed in stored extracts of two tables of unnamed origin. A few last digits are off by one or were cut; they are
marked, and the value that is right stands beside them as a fraction. Another table of the same kind was left out: it
has a return loss of 10.2 dB for SWR 1.8.
"""

from math import log10

import numpy as np
import pytest

import feedpoint
from feedpoint.line.reflection import return_loss_db, swr_from_reflection
from tests.published.printed import printed

REFERENCE_OHM = 50.0

# SWR: reflection, reflected power [%], return loss [dB], mismatch loss [dB]
BY_SWR = {
    1.1: (".05", ".23", "26.43", ".01"),
    1.2: (".09", ".83", "20.83", ".04"),
    1.5: (".20", "4.00", "13.98", ".18"),
    1.8: (".29", "8.16", "10.88", ".37"),
    2.0: (".33", "11.11", "9.54", ".51"),
    2.5: (".43", "18.36", "7.36", ".88"),
    3.0: (".50", "25.00", "6.02", "1.25"),
    4.0: (".60", "36.00", "4.44", "1.94"),
    5.0: (".67", "44.43", "3.52", "2.55"),
    6.0: (".71", "51.02", "2.92", "3.10"),
    10.0: (".82", "66.94", "1.74", "4.81"),
}
# Where the last printed digit is not that of the right value: Gamma is 3/7, 2/3 and 1/21. (The table was computed from
# four decimals of the reflection: 0.4285^2 = 0.1836, 0.6666^2 = 0.4443.)
RIGHT_POWER = {2.5: 100.0 * (3.0 / 7.0) ** 2, 5.0: 100.0 * (2.0 / 3.0) ** 2}
RIGHT_RETURN_LOSS = {1.1: 20.0 * log10(21.0)}

# Return loss [dB]: SWR, reflection
BY_RETURN_LOSS = {
    1.0: ("17.391", ".891"),
    2.0: ("8.724", ".794"),
    3.0: ("5.848", ".708"),
    6.0: ("3.010", ".501"),
    10.0: ("1.925", ".316"),
    14.0: ("1.499", ".200"),
    20.0: ("1.222", ".100"),
    26.0: ("1.105", None),
    30.0: ("1.065", ".032"),
}
RIGHT_SWR = {26.0: (1.0 + 10.0**-1.3) / (1.0 - 10.0**-1.3)}  # 1.1055, cut


def corrected(right, key, text):
    """The printed number, or the right value where the print is marked as wrong in its last digit."""
    return pytest.approx(right[key], rel=1e-12) if key in right else printed(text)


@pytest.mark.parametrize(
    ("right", "text"),
    [
        (RIGHT_POWER[2.5], BY_SWR[2.5][1]),
        (RIGHT_POWER[5.0], BY_SWR[5.0][1]),
        (RIGHT_RETURN_LOSS[1.1], BY_SWR[1.1][2]),
        (RIGHT_SWR[26.0], BY_RETURN_LOSS[26.0][0]),
    ],
)
def test_marked_digits_are_slips_of_one_unit_and_no_more(right, text):
    unit = 10.0 ** -len(text.partition(".")[2])
    assert unit / 2.0 < right - float(text) < 1.5 * unit


@pytest.fixture(params=["high", "low"])
def load_ohm(request):
    """Resistance of an SWR: above the reference, or below it."""
    return {"high": lambda swr: REFERENCE_OHM * swr, "low": lambda swr: REFERENCE_OHM / swr}[request.param]


@pytest.mark.parametrize("swr", BY_SWR)
def test_by_swr(swr, load_ohm):
    reflection, power_percent, return_loss, mismatch_loss = BY_SWR[swr]
    sweep = feedpoint.Sweep.from_impedance([10e6], [load_ohm(swr)], reference_ohm=REFERENCE_OHM)
    columns = feedpoint.deembed(sweep, feedpoint.Run(())).columns
    reflected = columns["shack_power_reflected_percent"][0]
    assert columns["shack_swr"][0] == pytest.approx(swr, rel=1e-12)
    assert columns["shack_gamma_magnitude"][0] == printed(reflection)
    assert reflected == corrected(RIGHT_POWER, swr, power_percent)
    assert columns["shack_return_loss_db"][0] == corrected(RIGHT_RETURN_LOSS, swr, return_loss)
    assert -10.0 * log10(1.0 - reflected / 100.0) == printed(mismatch_loss)


@pytest.mark.parametrize("swr", BY_SWR)
def test_reflection_gives_the_swr_back(swr):
    # The return loss is known to 0.005 dB (0.015 where it is a slip), and 8.686 dB are one neper of
    # the reflection; dSWR/dGamma = 2/(1 - Gamma)^2.
    magnitude = 10.0 ** (-float(BY_SWR[swr][2]) / 20.0)
    known_db = 0.015 if swr in RIGHT_RETURN_LOSS else 0.005
    tolerance = 2.0 / (1.0 - magnitude) ** 2 * known_db / 8.686 * magnitude
    assert swr_from_reflection(np.array([magnitude + 0j]))[0] == pytest.approx(swr, abs=tolerance)


@pytest.mark.parametrize("loss_db", BY_RETURN_LOSS)
@pytest.mark.parametrize("angle_deg", [0.0, 77.0, 180.0])
def test_by_return_loss(loss_db, angle_deg):
    swr, reflection = BY_RETURN_LOSS[loss_db]
    magnitude = 10.0 ** (-loss_db / 20.0)
    gamma = np.array([magnitude * np.exp(1j * np.deg2rad(angle_deg))])
    assert swr_from_reflection(gamma)[0] == corrected(RIGHT_SWR, loss_db, swr)
    if reflection is not None:
        assert magnitude == printed(reflection)
        # The third decimal of the reflection is 4.34e-3/Gamma dB of the return loss.
        back = return_loss_db(np.array([float(reflection) + 0j]))[0]
        assert back == pytest.approx(loss_db, abs=4.35e-3 / float(reflection))
