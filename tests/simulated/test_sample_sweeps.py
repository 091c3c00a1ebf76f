"""The sample sweeps are what their script makes, and their run sheets tell the truth within what they state."""

import subprocess
import sys
import tomllib

import numpy as np
import pytest

from sample_sweeps import make_sample_sweeps as site
from tests.simulated.cables import CABLES, true_loss_db_per_100m
from tests.simulated.simulator import SPEED_OF_LIGHT

METRES_PER_FOOT = 0.3048
SHEETS = {
    "mast_feed.toml": (site.MAST_FEED, (site.SPRING_C,)),
    "main_run.toml": ([site.MAIN_RUN], (site.SPRING_C,)),
    "offcentre_feed.toml": (site.OFFCENTRE_FEED[:1], (site.SPRING_C,)),
    "vertical_feed.toml": (site.VERTICAL_FEED[1:], (site.SUMMER_C,)),
    "beam_feed.toml": ([site.BEAM_FEED[0], site.BEAM_FEED[-1]], (site.SUMMER_C,)),
}


def test_the_script_makes_the_committed_files(tmp_path):
    command = [sys.executable, str(site.HERE / "make_sample_sweeps.py"), "--out", str(tmp_path)]
    subprocess.run(command, check=True, timeout=60)
    made = {path.name: path.read_bytes() for path in tmp_path.iterdir()}
    assert made == {name: (site.HERE / name).read_bytes() for name in site.sample_files()}
    assert made == {name: text.encode() for name, text in site.sample_files().items()}


def test_the_folder_is_small_and_every_file_is_listed():
    files = [path for path in site.HERE.iterdir() if path.is_file()]
    assert sum(path.stat().st_size for path in files) < 400_000
    listed = (site.HERE / "README.md").read_text()
    assert [path.name for path in files if f"`{path.name}`" not in listed and path.name != "README.md"] == []


def described(section):
    """Catalogue cable of a section (None if it has its own figures), length [m] and the half-width of that."""
    cable = CABLES.get(section.get("cable"))
    length_m = section.get("length_m", section.get("length_ft", 0) * METRES_PER_FOOT)
    length_half = section.get("length_tolerance_m", section.get("length_tolerance_ft", 0) * METRES_PER_FOOT)
    return cable, length_m, length_half


@pytest.mark.parametrize("name", SHEETS)
def test_the_truth_lies_within_what_the_sheet_states(name):
    truths, temperatures = SHEETS[name]
    sheet = tomllib.loads((site.HERE / name).read_text())
    run = sheet["run"]
    for temperature_c in temperatures:
        assert abs(temperature_c - run["temperature_c"]) <= run["temperature_tolerance_c"]
    sections = [section for section in sheet["section"] if "length_m" in section or "length_ft" in section]
    for section, truth in zip(sections, truths, strict=True):
        cable, length_m, length_half = described(section)
        assert abs(truth["length_m"] - length_m) <= length_half
        if "delay_ns" in section:
            delay_ns = truth["length_m"] / (truth["velocity_factor"] * SPEED_OF_LIGHT) * 1e9
            assert abs(delay_ns - section["delay_ns"]) <= section["delay_tolerance_ns"]
        else:
            half = section.get("velocity_factor_tolerance", 0)
            assert abs(truth["velocity_factor"] - cable.velocity_factor) <= half
        z0_ohm = section.get("z0_ohm", cable.z0_ohm if cable else None)
        assert abs(truth["z0_ohm"] - z0_ohm) <= section.get("z0_tolerance_ohm", 0)
        percent = section["loss_tolerance_percent"]
        for mhz, db_per_100m in loss_points(section, cable):
            true_db = true_loss_db_per_100m(np.array([mhz * 1e6]), truth)[0]
            assert abs(true_db / db_per_100m - 1) <= percent / 100


def loss_points(section, cable):
    """The sheet's own points, else the loss of the catalogue's law at 10 and 100 MHz; (MHz, dB/100 m)."""
    if cable is None:
        return [(point["mhz"], point["db_per_100ft"] / METRES_PER_FOOT) for point in section["loss"]]
    return [(mhz, true_loss_db_per_100m(np.array([mhz * 1e6]), cable.section(1.0))[0]) for mhz in (10, 100)]


def test_the_damaged_file_ends_in_the_middle_of_a_record():
    text = (site.HERE / "dipole_20m_cut_short.s1p").read_text()
    assert not text.endswith("\n")
    assert len(text.splitlines()[-1].split()) == 2
