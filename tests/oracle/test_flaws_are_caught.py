"""
The comparison with the oracle can fail: one deliberate error per formula, put into the oracle, is noticed each time.

The run below has everything in it, in places where it matters: 1.9 MHz for the low-frequency effects, 38 C, a delay
that drifts, a two-port in 75 ohm that differs from end to end.
"""

import pytest

from tests.oracle.cases import Case
from tests.oracle.comparison import compare_deembed, compare_embed, worst
from tests.oracle.described import FLAWS, Cable, Series, Shunt, Transformer, TwoPort

NOTICED = 1e-6
"""Relative difference by which a flaw must show: ten thousand times what the comparison lets pass."""

GRID_HZ = (1.9e6, 7.1e6, 29.2e6)
SECTIONS = (
    Shunt(resistance_ohm=2200.0, capacitance_f=40e-12),
    Cable(z0_ohm=50.0, length_m=31.0, velocity_factor=0.66, conductor_loss=1.4, dielectric_loss=0.02, floor_loss=0.3,
          delay_tempco_ppm_per_k=-150.0),
    TwoPort(75.0, dict.fromkeys(GRID_HZ, ((0.2 + 0.1j, 0.7j), (0.72j, -0.15 + 0.2j)))),
    Series(resistance_ohm=2.0, capacitance_f=200e-12),
    Transformer(4.0),
    Cable(z0_ohm=75.0, length_m=9.0, velocity_factor=0.82, conductor_loss=0.8, dielectric_loss=0.006),
)  # fmt: skip
CASE = Case("everything", SECTIONS, 38.0, 50.0, GRID_HZ, (12 - 300j, 60 + 35j, 140 - 90j))

SHOWN_BY = {
    "total loss from reflections": "total_loss_db",
    "matched loss from the law": "matched_loss_db",
    "electrical length from velocity": "electrical_length_wavelengths",
}
"""Flaws that leave the impedances alone, and the quantity where they must show."""


@pytest.mark.parametrize("compare", [compare_deembed, compare_embed])
def test_without_a_flaw_the_package_agrees(tmp_path, compare):
    assert all(d.error <= d.allowed for d in compare(tmp_path, CASE))


@pytest.mark.parametrize("flaw", FLAWS)
def test_flaw_shows_at_the_antenna(tmp_path, flaw):
    found = worst(compare_deembed(tmp_path, CASE, flaw), SHOWN_BY.get(flaw, "feedpoint_ohm"))
    assert found.error > NOTICED
    assert found.error > found.allowed


@pytest.mark.parametrize("flaw", FLAWS)
def test_flaw_shows_at_the_shack(tmp_path, flaw):
    found = worst(compare_embed(tmp_path, CASE, flaw), SHOWN_BY.get(flaw, "shack_ohm"))
    assert found.error > NOTICED
    assert found.error > found.allowed


@pytest.mark.parametrize("flaw", ["no temperature", "temperature squared", "no conductance", "feet for metres"])
def test_flaw_of_the_loss_shows_in_the_matched_loss(tmp_path, flaw):
    # A rounded neper does not: it divides in the law and multiplies in the result. The impedances show it.
    assert worst(compare_deembed(tmp_path, CASE, flaw), "matched_loss_db").error > NOTICED
