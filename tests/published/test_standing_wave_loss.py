"""
Total loss of a line with standing waves: points that handbooks print, and a grid.

Printed in stored extracts: *ARRL Handbook* 1991, figure 23 (200 ft of RG-213 at 20 MHz, and 200 ft of open-wire line);
*ARRL Antenna Book* 1994, p. 24-9 (100 ft of RG-213 at 4 MHz, and 100 ft of 1-inch window line); a worked check of a
shorted cable and a limit of the loss with the antenna left on, both of amateur-radio discussions. "Additional loss due
to SWR" in them is the standing-wave loss here. The grid is computed here.

All assume a real characteristic impedance, so the lines here are distortionless: series and shunt take half each. Then
    total = 10 log10 [(a^2 - r^2)/(a (1 - r^2))]        a = 10^(matched loss/10), r = |Gamma| at the load,
whatever the electrical length, of which several are tried.
"""

import pytest

from tests.published.lines import carried_to_shack, distortionless_line, total_loss_db
from tests.published.printed import printed

Z0_OHM = 50.0
LENGTHS = pytest.mark.parametrize("wavelengths", [0.08, 0.25, 1.37])


@LENGTHS
@pytest.mark.parametrize(
    ("matched_db", "swr", "total_db", "standing_wave_db"),
    [
        (2.0, 8.0, "4.837", "2.837"),
        (0.08, 20.0, "0.737", "0.657"),  # the source says 0.04 dB, which is for 100 ft: see below
        (0.6, 3.6, "1.066", None),
        (0.027, 32.0, "0.41", None),
    ],
)
def test_printed_points(matched_db, swr, total_db, standing_wave_db, wavelengths):
    line = distortionless_line(Z0_OHM, matched_db, wavelengths)
    columns = carried_to_shack(swr * Z0_OHM, line).columns
    assert columns["feedpoint_swr"][0] == pytest.approx(swr, rel=1e-12)
    assert columns["total_loss_db"][0] == printed(total_db)
    if standing_wave_db is not None:
        assert columns["total_loss_db"][0] - columns["matched_loss_db"][0] == printed(standing_wave_db)


def test_a_low_impedance_load_of_the_same_swr_loses_as_much():
    assert total_loss_db(Z0_OHM / 8.0, distortionless_line(Z0_OHM, 2.0)) == printed("4.837")


def test_slip_of_the_open_wire_example():
    # "0.04 dB" is the loss of 100 ft; for the 200 ft of the example it would give 0.384 dB, not the printed 0.737.
    assert total_loss_db(20.0 * Z0_OHM, distortionless_line(Z0_OHM, 0.04)) == printed("0.384")


# Matched loss [dB], SWR at the load: total loss [dB], SWR at the input; computed.
GRID = {
    (0.5, 2.0): ("0.6102", "1.845"),
    (0.5, 5.0): ("1.1615", "3.928"),
    (0.5, 10.0): ("2.0121", "6.386"),
    (1.0, 2.0): ("1.1959", "1.720"),
    (1.0, 3.0): ("1.5039", "2.318"),
    (1.0, 5.0): ("2.1235", "3.251"),
    (1.0, 10.0): ("3.4237", "4.713"),
    (1.0, 20.0): ("5.2575", "6.109"),
    (3.0, 2.0): ("3.3886", "1.401"),
    (3.0, 3.0): ("3.9677", "1.669"),
    (3.0, 5.0): ("5.0386", "2.004"),
    (3.0, 10.0): ("7.0077", "2.390"),
    (3.0, 20.0): ("9.4138", "2.659"),
    (6.0, 5.0): ("8.4292", "1.402"),
}


@LENGTHS
@pytest.mark.parametrize(("matched_db", "swr"), GRID)
def test_computed_grid(matched_db, swr, wavelengths):
    total_db, input_swr = GRID[matched_db, swr]
    columns = carried_to_shack(swr * Z0_OHM, distortionless_line(Z0_OHM, matched_db, wavelengths)).columns
    assert columns["total_loss_db"][0] == printed(total_db)
    assert columns["shack_swr"][0] == printed(input_swr)


@LENGTHS
def test_shorted_cable_of_3_db(wavelengths):
    # 50 m of RG-213 shorted at its end, SWR 3 at 50 MHz: reflection 0.5, return loss 6 dB, 3 dB one way, 6 dB/100 m.
    columns = carried_to_shack(0.0, distortionless_line(Z0_OHM, 3.0, wavelengths)).columns
    assert columns["shack_swr"][0] == printed("3")
    assert columns["shack_swr"][0] == printed("3.0095")  # computed
    assert columns["shack_return_loss_db"][0] == pytest.approx(6.0, rel=1e-12)


def test_loss_that_an_off_band_swr_of_9_allows_at_most():
    # 0.97 dB, printed; a fully reflective antenna behind that loss shows the SWR of 9. SWR = coth(one-way nepers),
    # whose slope is 80 per Np here: the 0.005 dB to which the loss is known are 5.8e-4 Np, 0.046 of the SWR.
    columns = carried_to_shack(complex("inf"), distortionless_line(Z0_OHM, 0.97)).columns
    assert columns["shack_swr"][0] == pytest.approx(9.0, abs=0.05)
    assert columns["shack_return_loss_db"][0] / 2.0 == printed("0.97")
