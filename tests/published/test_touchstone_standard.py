"""
IBIS Open Forum, *Touchstone File Format Specification*, versions 1.1 (2002), 2.0 (2009) and 2.1 (2024): the examples
of the standard, by their numbers in version 2.0.

The numbers of the examples are those that the test script of scikit-rf 2.2 (skrf/io/tests/test_ts_spec.py,
BSD-3-Clause) states for them; neither the standard nor that library's example files were at hand, so the files in
`touchstone/` were written anew around these numbers, with layout and comments after the standard from memory. From
memory without a second witness: the noise data of example 18, the reference of 75 ohm of example 9 (0.99 * 75 = 74.25
and so on fits examples 7 and 10), and the header of example 16. Example 1 (an option line) and 15 are missing. Files
whose comment says "not of the standard" are variants made here.

Each file is read twice: against what the standard says of its numbers, and against the reader of scikit-rf where that
is right. That reader multiplies version-1 Y data by R instead of dividing; those have the standard's meaning alone.
"""

from pathlib import Path

import numpy as np
import pytest
from skrf.io.touchstone import Touchstone

import feedpoint
from feedpoint.sweep.reader import read_network, read_sweep

HERE = Path(__file__).parent / "touchstone"
# Both readers work in double precision, through a handful of operations.
ROUNDING = 1e-14


def phasors(magnitudes, angles_deg):
    return np.array(magnitudes) * np.exp(1j * np.deg2rad(np.array(angles_deg, dtype=float)))


def of_impedances(impedance_ohm, reference_ohm):
    return (impedance_ohm - reference_ohm) / (impedance_ohm + reference_ohm)


EXAMPLE_2_OHM = phasors([11, 12, 13, 14, 15], [10, 20, 30, 40, 50])
EXAMPLE_7_OHM = phasors([74.25, 60.0, 53.025, 30.0, 0.75], [-4, -22, -45, -62, -89])

FOUR_PORT = phasors(
    [[0.60, 0.40, 0.42, 0.53], [0.40, 0.60, 0.53, 0.42], [0.42, 0.53, 0.60, 0.40], [0.53, 0.42, 0.40, 0.60]],
    [
        [161.24, -42.20, -66.58, -79.34],
        [-42.20, 161.20, -79.34, -66.58],
        [-66.58, -79.34, 161.24, -42.20],
        [-79.34, -66.58, -42.20, 161.24],
    ],
)
EXAMPLE_14_FIRST_ROWS = phasors(
    [[0.60, 0.40, 0.42, 0.53], [0.57, 0.40, 0.41, 0.57], [0.50, 0.45, 0.37, 0.62]],
    [[161.24, -42.20, -66.58, -79.34], [150.37, -44.34, -81.24, -95.77], [136.69, -46.41, -99.09, -114.19]],
)
EXAMPLE_17 = phasors([[[0.95, 0.04], [3.57, 0.66]], [[0.60, 0.14], [1.30, 0.56]]],
                     [[[-26, 76], [157, -14]], [[-144, 40], [40, -85]]])

# File: frequencies [Hz], S parameters (F, n, n) or, of a one-port, (F,), references [ohm].
MEANING = {
    "example_02.ts": ([1e6, 2e6, 3e6, 4e6, 5e6], of_impedances(EXAMPLE_2_OHM, 50.0), [50]),
    "example_03.ts": ([1e9, 2e9], [[[111, 112], [121, 122]], [[211, 212], [221, 222]]], [50, 50]),
    "example_04.ts": (
        [1e9],
        [[[11, 12, 13, 14], [21, 22, 23, 24], [31, 32, 33, 34], [41, 42, 43, 44]]],
        [50, 75, 0.01, 0.01],
    ),
    "example_05.ts": ([5e9, 6e9], [FOUR_PORT, FOUR_PORT], [50, 75, 0.01, 0.01]),
    "example_06.ts": ([5e9, 6e9], [FOUR_PORT, FOUR_PORT], [50, 75, 0.01, 0.01]),
    "example_06_upper.ts": ([5e9, 6e9], [FOUR_PORT, FOUR_PORT], [50, 75, 0.01, 0.01]),
    "example_07.ts": ([1e8, 2e8, 3e8, 4e8, 5e8], of_impedances(EXAMPLE_7_OHM, 20.0), [20]),
    "example_08.s1p": ([2e6], phasors([0.894], [-12.136]), [50]),
    "example_09.s1p": ([1e8, 2e8, 3e8, 4e8, 5e8], of_impedances(EXAMPLE_7_OHM, 75.0), [75]),
    "example_09_as_admittance.y1p": ([1e8, 2e8, 3e8, 4e8, 5e8], of_impedances(EXAMPLE_7_OHM, 75.0), [75]),
    "example_10.ts": ([1e8, 2e8, 3e8, 4e8, 5e8], of_impedances(EXAMPLE_7_OHM, 75.0), [75]),
    "example_10_as_admittance.ts": ([1e8, 2e8, 3e8, 4e8, 5e8], of_impedances(EXAMPLE_7_OHM, 75.0), [75]),
    "example_13.s2p": (
        [1e9, 2e9, 10e9],
        [
            [[0.3926 - 0.1211j, -0.0003 - 0.0021j], [-0.0003 - 0.0021j, 0.3926 - 0.1211j]],
            [[0.3517 - 0.3054j, -0.0096 - 0.0298j], [-0.0096 - 0.0298j, 0.3517 - 0.3054j]],
            [[0.3419 + 0.3336j, -0.0134 + 0.0379j], [-0.0134 + 0.0379j, 0.3419 + 0.3336j]],
        ],
        [50, 50],
    ),
    "example_17.ts": ([2e9, 22e9], EXAMPLE_17, [50, 25]),
    "example_18.s2p": ([2e9, 22e9], EXAMPLE_17, [50, 50]),
}
REFUSED = {
    "example_11.s2p": (2, "H parameters"),
    "example_12.ts": (3, "H parameters"),
    "example_12_g.ts": (3, "G parameters"),
    "example_16.ts": (7, "mixed-mode"),
}
FOUR_PORT_OF_VERSION_1 = "example_14.s4p"
# The admittances of these variants are written with 16 digits.
LAST_DIGIT = {"example_09_as_admittance.y1p": 2e-15, "example_10_as_admittance.ts": 2e-15}
MISREAD_BY_SCIKIT_RF = {"example_09_as_admittance.y1p"}


def matrices(network):
    return network.points.frequency_hz, network.points.values, network.reference_ohm


def test_every_example_file_has_its_test():
    expected = {*MEANING, *REFUSED, FOUR_PORT_OF_VERSION_1}
    assert {path.name for path in HERE.iterdir()} == expected


@pytest.mark.parametrize("name", MEANING)
def test_numbers_mean_what_the_standard_says(name):
    frequency_hz, scattering, reference_ohm = matrices(read_network(HERE / name))
    expected_hz, expected, expected_reference = MEANING[name]
    expected = np.asarray(expected, dtype=complex)
    expected = expected[:, None, None] if expected.ndim == 1 else expected
    assert frequency_hz == pytest.approx(expected_hz, rel=ROUNDING)
    assert reference_ohm.tolist() == expected_reference
    assert scattering.shape == expected.shape
    np.testing.assert_allclose(scattering, expected, rtol=ROUNDING, atol=ROUNDING + LAST_DIGIT.get(name, 0.0))


@pytest.mark.parametrize("name", [*(name for name in MEANING if name not in MISREAD_BY_SCIKIT_RF), "example_14.s4p"])
def test_reads_as_scikit_rf_reads(name):
    frequency_hz, scattering, reference_ohm = matrices(read_network(HERE / name))
    theirs = Touchstone(HERE / name)
    np.testing.assert_allclose(frequency_hz, theirs.f, rtol=ROUNDING)
    np.testing.assert_allclose(scattering, theirs.s, rtol=ROUNDING, atol=ROUNDING)
    np.testing.assert_allclose(np.tile(reference_ohm, (frequency_hz.size, 1)), theirs.z0, rtol=0, atol=0)


def test_four_port_of_version_1_goes_row_by_row():
    frequency_hz, scattering, _ = matrices(read_network(HERE / FOUR_PORT_OF_VERSION_1))
    assert frequency_hz.tolist() == [5e9, 6e9, 7e9]
    np.testing.assert_allclose(scattering[0], FOUR_PORT, rtol=ROUNDING)
    np.testing.assert_allclose(scattering[:, 0, :], EXAMPLE_14_FIRST_ROWS, rtol=ROUNDING)
    np.testing.assert_array_equal(scattering, scattering.transpose(0, 2, 1))


def test_two_ports_of_version_1_go_column_by_column():
    # S21 of the amplifier of example 18 is the large one, 3.57 at 157 degrees; it stands second in the file.
    _, scattering, _ = matrices(read_network(HERE / "example_18.s2p"))
    assert scattering[0, 1, 0] == pytest.approx(phasors(3.57, 157), rel=ROUNDING)
    assert scattering[0, 0, 1] == pytest.approx(phasors(0.04, 76), rel=ROUNDING)


def test_two_port_data_order_of_version_2_turns_the_matrix(tmp_path):
    text = (HERE / "example_03.ts").read_text()
    turned = tmp_path / "turned.ts"
    turned.write_text(text.replace("12_21", "21_12"))
    _, as_printed, _ = matrices(read_network(HERE / "example_03.ts"))
    _, as_turned, _ = matrices(read_network(turned))
    np.testing.assert_array_equal(as_turned, as_printed.transpose(0, 2, 1))
    np.testing.assert_array_equal(as_turned, Touchstone(turned).s)


@pytest.mark.parametrize("name", sorted(name for name in [*MEANING, FOUR_PORT_OF_VERSION_1] if name.endswith(".ts")))
def test_version_2_1_reads_the_same(name, tmp_path):
    newer = tmp_path / name
    newer.write_text((HERE / name).read_text().replace("[Version] 2.0", "[Version] 2.1"))
    network = read_network(newer)
    assert network.understood_as["version"] == "2.1"
    np.testing.assert_array_equal(network.points.values, read_network(HERE / name).points.values)


def test_version_1_and_2_of_one_impedance_are_one_sweep():
    # Examples 9 and 10: normalised to R in version 1, plain ohms in version 2.
    sweeps = [read_sweep(HERE / name) for name in ("example_09.s1p", "example_10.ts")]
    np.testing.assert_allclose(sweeps[0].gamma, sweeps[1].gamma, rtol=ROUNDING)
    impedance = feedpoint.deembed(sweeps[0], feedpoint.Run(())).impedance_ohm
    np.testing.assert_allclose(impedance, EXAMPLE_7_OHM, rtol=1e-13)  # 1 - Gamma loses a digit


def test_impedance_does_not_depend_on_the_reference():
    # Examples 7 and 10: the same ohms, with a reference of 20 and of 75 ohm.
    sweeps = [read_sweep(HERE / name) for name in ("example_07.ts", "example_10.ts")]
    assert [sweep.reference_ohm for sweep in sweeps] == [20.0, 75.0]
    results = [feedpoint.deembed(sweep, feedpoint.Run(())).impedance_ohm for sweep in sweeps]
    np.testing.assert_allclose(results[0], results[1], rtol=1e-13)


@pytest.mark.parametrize("name", ["example_17.ts", "example_18.s2p"])
def test_noise_data_are_skipped_and_said_so(name):
    network = read_network(HERE / name)
    assert network.points.frequency_hz.size == 2
    codes = [finding.code for finding in network.findings]
    assert "noise-data-skipped" in codes
    assert "doubtful-file" not in codes


@pytest.mark.parametrize("name", [*MEANING, FOUR_PORT_OF_VERSION_1])
def test_examples_of_the_standard_are_not_doubtful(name):
    assert not [finding for finding in read_network(HERE / name).findings if finding.code == "doubtful-file"]


@pytest.mark.parametrize(("port", "expected"), [(1, EXAMPLE_17[:, 0, 0]), (2, EXAMPLE_17[:, 1, 1])])
def test_one_port_of_a_two_port(port, expected):
    sweep = read_sweep(HERE / "example_17.ts", port=port)
    np.testing.assert_allclose(sweep.gamma, expected, rtol=ROUNDING)
    assert sweep.reference_ohm == {1: 50.0, 2: 25.0}[port]


@pytest.mark.parametrize("name", REFUSED)
def test_what_has_no_reflection_of_a_port_is_refused_with_its_line(name):
    line, words = REFUSED[name]
    with pytest.raises(feedpoint.SweepRefused) as refusal:
        read_network(HERE / name)
    assert refusal.value.line == line
    assert words in refusal.value.message
    assert name in str(refusal.value)


def test_option_line_defaults_are_ghz_s_ma_50(tmp_path):
    # Version 1.1 and 2.0: the defaults of the option line.
    bare = tmp_path / "bare.s1p"
    bare.write_text("#\n2.000 0.894 -12.136\n")
    sweep = read_sweep(bare)
    assert sweep.frequency_hz[0] == 2e9
    assert sweep.reference_ohm == 50.0
    np.testing.assert_allclose(sweep.gamma, phasors([0.894], [-12.136]), rtol=ROUNDING)


@pytest.mark.parametrize("options", ["R 75 MA Z MHz", "mhz z ma r 75", "MA MHz R 75.0 Z"])
def test_option_words_in_any_order_and_case(options, tmp_path):
    other = tmp_path / "other.s1p"
    other.write_text((HERE / "example_09.s1p").read_text().replace("MHz Z MA R 75", options))
    np.testing.assert_array_equal(read_sweep(other).gamma, read_sweep(HERE / "example_09.s1p").gamma)
