"""
D. M. Pozar, *Microwave Engineering*, 4th edition, Wiley 2012, chapter 2: examples 2.2, 2.4 and 2.5.

Data and answers from memory, reproduced numerically. The book's answers are rounded from unrounded intermediate values,
so each is held to half a unit of its last digit.
"""

import pytest

from feedpoint.line.reflection import impedance_from_reflection
from tests.published.lines import carried_to_antenna, carried_to_shack, degrees, input_ohm, lossless_line, polar
from tests.published.printed import printed

LINE_OHM, LOAD_OHM, WAVELENGTHS = 100.0, 40 + 70j, 0.3  # example 2.2


@pytest.fixture(scope="module")
def example_2_2():
    return carried_to_shack(LOAD_OHM, lossless_line(LINE_OHM, WAVELENGTHS), reference_ohm=LINE_OHM)


def test_example_2_2_reflection_at_the_load(example_2_2):
    assert abs(example_2_2.gamma[0]) == printed("0.59")
    assert degrees(example_2_2.gamma[0]) == printed("104")


def test_example_2_2_reflection_at_the_input(example_2_2):
    at_input = example_2_2.planes.gamma[0, 0]
    assert abs(at_input) == printed("0.59")
    assert degrees(at_input) % 360.0 == printed("248")


def test_example_2_2_input_impedance(example_2_2):
    impedance = example_2_2.planes.impedance_ohm[0, 0]
    assert impedance.real == printed("36.5")
    assert impedance.imag == printed("-61.1")


def test_example_2_2_swr_and_return_loss(example_2_2):
    # Lossless: the same at both ends.
    for end in ("shack", "feedpoint"):
        assert example_2_2.columns[f"{end}_swr"][0] == printed("3.87")
        assert example_2_2.columns[f"{end}_return_loss_db"][0] == printed("4.6")


def test_example_2_2_load_is_recovered_from_the_printed_input_impedance():
    # 36.5 - j61.1 is known to 0.05 ohm in each part. For a lossless line |dZ_load/dZ_in| is the ratio of the
    # resistances, 40/36.5 = 1.10: 1.10 * 0.05 * sqrt(2) = 0.078 ohm of the load.
    result = carried_to_antenna(36.5 - 61.1j, lossless_line(LINE_OHM, WAVELENGTHS))
    assert result.impedance_ohm[0] == pytest.approx(LOAD_OHM, abs=0.078)


def test_example_2_4_slotted_line():
    # SWR 1.5 on 50 ohm, minima 2 cm apart (a wavelength is 4 cm), the first one 1.48 cm from the load: there the
    # impedance is 50/1.5, and 0.37 wavelengths on stands the load.
    result = carried_to_antenna(50.0 / 1.5, lossless_line(50.0, 1.48 / 4.0))
    assert abs(result.gamma[0]) == printed("0.2")
    assert degrees(result.gamma[0]) == printed("86.4")
    assert result.impedance_ohm[0].real == printed("47.3")
    assert result.impedance_ohm[0].imag == printed("19.7")


def test_example_2_4_impedance_of_the_printed_reflection():
    # The angle is known to 0.05 deg: |dZ| = |Z + 50|^2/100 |dGamma| = 99 * 0.2 * 8.7e-4 = 0.017 ohm beside the 0.05 of
    # the printed impedance.
    impedance = impedance_from_reflection(polar(0.2, 86.4), 50.0)
    assert impedance.real == pytest.approx(47.3, abs=0.067)
    assert impedance.imag == pytest.approx(19.7, abs=0.067)


def test_example_2_5_quarter_wave_section_matches_100_to_50_ohm():
    # 70.71 ohm is known to 0.005: the input is 70.71^2/100 = 50.00 within 2 * 0.00007 * 50 = 0.007 ohm.
    assert input_ohm(100.0, lossless_line(70.71, 0.25)) == pytest.approx(50.0, abs=0.0075)
