"""
Common practice, no source: figures that antenna engineers know or find with a paper chart and a field instrument.

Where digits are given they are computed here by hand arithmetic; the chart's and the instrument's readings stand beside
them with what such a reading is worth.
"""

from math import log10, pi

import numpy as np
import pytest

import feedpoint
from feedpoint.assumed import Assumed
from feedpoint.line.reflection import reflection_from_impedance, return_loss_db, swr_from_reflection
from tests.published.lines import carried_to_shack, degrees, input_ohm, load_ohm, lossless_line
from tests.published.printed import printed

FREQUENCY_HZ = 14.2e6
ANTENNA = feedpoint.LumpedSection(
    "33 ohm and 220 pF", "series", resistance_ohm=Assumed(33.0), capacitance_f=Assumed(220e-12)
)
LEAD = feedpoint.CableSection(
    "1 m", Assumed(50.0), Assumed(0.66), Assumed(1.0), Assumed(feedpoint.LossLaw(0.0))
)


@pytest.fixture(scope="module")
def antenna():
    """Resistor and capacitor with a short behind them."""
    return carried_to_shack(0.0, ANTENNA, frequency_hz=FREQUENCY_HZ)


def test_33_ohm_and_220_pf(antenna):
    impedance = antenna.planes.impedance_ohm[0, 0]
    assert impedance.real == printed("33")
    assert impedance.imag == printed("-51")
    assert impedance.imag == pytest.approx(-1.0 / (2.0 * pi * FREQUENCY_HZ * 220e-12), rel=1e-12)


def test_33_j51_ohm_as_reflection():
    gamma = reflection_from_impedance(np.array([33 - 51j]), 50.0)
    # (33 - 50 - j51)/(33 + 50 - j51): sqrt(17^2 + 51^2)/sqrt(83^2 + 51^2) = 53.759/97.416 = 0.55185; with -j50.95 for
    # -j51 it is 0.5515. Angle -108.43 + 31.57 degrees.
    assert abs(gamma[0]) == pytest.approx(0.5515, abs=0.0005)
    assert degrees(gamma[0]) == printed("-76.9")


def test_33_ohm_and_220_pf_as_reflection(antenna):
    columns = antenna.columns
    assert columns["shack_gamma_magnitude"][0] == printed("0.5515")
    assert columns["shack_gamma_angle_deg"][0] == printed("-76.9")
    assert columns["shack_return_loss_db"][0] == printed("5.17")
    assert columns["shack_return_loss_db"][0] == pytest.approx(-20.0 * log10(0.5515), abs=0.001)
    assert columns["shack_swr"][0] == printed("3.46")


def test_paper_chart_agrees_as_well_as_it_can_be_read(antenna):
    # Read as 0.54, -76.4 degrees, 5.25 dB, SWR 3.4. One millimetre on a chart of 80 mm radius is 0.0125 of reflection:
    # 1.3 degrees at 0.55, 0.20 dB of return loss, and 2/(1 - 0.55)^2 = 9.9 times as much SWR, 0.12.
    columns = antenna.columns
    assert columns["shack_gamma_magnitude"][0] == pytest.approx(0.54, abs=0.0125)
    assert columns["shack_gamma_angle_deg"][0] == pytest.approx(-76.4, abs=1.3)
    assert columns["shack_return_loss_db"][0] == pytest.approx(5.25, abs=0.20)
    assert columns["shack_swr"][0] == pytest.approx(3.4, abs=0.12)


def test_one_metre_of_lead_is_0_0718_wavelengths():
    columns = carried_to_shack(50.0, LEAD, frequency_hz=FREQUENCY_HZ).columns
    assert columns["electrical_length_wavelengths"][0] == printed("0.0718")


def test_antenna_behind_the_lead():
    # A shack reading of 17.8 - j22 ohm. Through a lossless lead, ohms at the antenna are 33/17.5 = 1.9 times those at
    # the shack end; elements of 1 % (0.5 ohm of the reactance) and a reading to half an ohm make an ohm and a half.
    assert abs(load_ohm(17.8 - 22j, LEAD, frequency_hz=FREQUENCY_HZ) - (33 - 51j)) < 1.5


def test_lead_shows_what_an_instrument_showed():
    # 18.2 - j22.6 ohm. A field instrument's directivity of 30 dB is 0.032 of reflection, and there
    # |dZ/dGamma| = |Z + 50|^2/100 = 50 ohm: 1.6 ohm.
    assert abs(input_ohm(33 - 51j, LEAD, frequency_hz=FREQUENCY_HZ) - (18.2 - 22.6j)) < 1.6


def test_lead_and_antenna_in_one_run(antenna):
    there = input_ohm(0.0, LEAD, ANTENNA, frequency_hz=FREQUENCY_HZ)
    antenna_ohm = antenna.planes.impedance_ohm[0, 0]
    assert load_ohm(there, LEAD, frequency_hz=FREQUENCY_HZ) == pytest.approx(antenna_ohm, rel=1e-12)


# A wavelength is exact to rounding of beta l, a few 1e-16 of a turn; the reflection of an extreme load turns by as
# much.
ROUNDING = 1e-13


@pytest.mark.parametrize("z0_ohm", [50.0, 75.0, 300.0])
@pytest.mark.parametrize("load", [33 - 51j, 1000 + 0j, 0j, complex("inf")])
@pytest.mark.parametrize("half_waves", [1, 2, 7])
def test_half_wave_of_any_line_repeats_its_load(z0_ohm, load, half_waves):
    result = carried_to_shack(load, lossless_line(z0_ohm, half_waves / 2.0))
    assert result.planes.gamma[0, 0] == pytest.approx(result.gamma[0], abs=ROUNDING)


@pytest.mark.parametrize("z0_ohm", [50.0, 75.0, 300.0])
def test_quarter_wave_turns_an_open_into_a_short_and_back(z0_ohm):
    line = lossless_line(z0_ohm, 0.25)
    assert carried_to_shack(complex("inf"), line).planes.gamma[0, 0] == pytest.approx(-1.0, abs=ROUNDING)
    assert carried_to_shack(0.0, line).planes.gamma[0, 0] == pytest.approx(1.0, abs=ROUNDING)


@pytest.mark.parametrize("load", [25.0, 33 - 51j, 200.0])
def test_quarter_wave_inverts(load):
    assert input_ohm(load, lossless_line(75.0, 0.25)) == pytest.approx(75.0**2 / load, rel=1e-12)


def test_eighth_wave_turns_a_short_into_plus_j_z0():
    assert input_ohm(0.0, lossless_line(50.0, 0.125)) == pytest.approx(50j, rel=1e-12)


@pytest.mark.parametrize("resistance_ohm", [25.0, 100.0])
def test_25_and_100_ohm_have_swr_2(resistance_ohm):
    gamma = reflection_from_impedance(np.array([resistance_ohm + 0j]), 50.0)
    assert swr_from_reflection(gamma)[0] == pytest.approx(2.0, rel=1e-14)
    assert return_loss_db(gamma)[0] == printed("9.54")


def test_matched_load_shows_itself_through_any_length():
    for wavelengths in (0.1, 0.33, 2.71):
        assert input_ohm(50.0, lossless_line(50.0, wavelengths)) == pytest.approx(50.0, rel=1e-13)
