"""
Make the sweeps of Merrow Skerry, an invented site: simulated antennas through simulated runs.

    python sample_sweeps/make_sample_sweeps.py              write the sweeps beside this file
    python sample_sweeps/make_sample_sweeps.py --out DIR    write them into another folder

The run sheets in this folder say what the people of the site believe about their runs. What the runs really are stands
here: every figure lies inside the tolerance that the sheet states, and none is exactly the sheet's.
Running the script again gives the same bytes: the seeds are fixed, and they feed RandomState, whose numbers, unlike
those of the newer generators, are promised to stay.
"""

import argparse
import sys
from pathlib import Path
from typing import Any

import numpy as np

HERE = Path(__file__).resolve().parent
if __name__ == "__main__":
    sys.path.insert(0, str(HERE.parent))  # the simulator lives among the tests and is not installed

from tests.simulated.cables import CABLES  # noqa: E402
from tests.simulated.simulator import (  # noqa: E402
    Analyzer,
    draw_analyzer,
    load_antenna,
    measured,
    run_chain,
    scattering,
    shack_reflection,
)
from tests.simulated.sweep_files import delimited_text, touchstone_2_text, touchstone_text  # noqa: E402

SPRING_C, SUMMER_C, WINTER_C = 11.0, 29.0, -4.5
INVENTED = "Merrow Skerry is an invented site; simulated data, nobody's measurement"


def cable(name: str, length_m: float, *, loss: float = 1.0, **changes: float) -> dict[str, float]:
    """A length of catalogue cable whose loss is `loss` times what is printed; `changes` replace its figures."""
    section = CABLES[name].section(length_m, **changes)
    return {**section, **{term: loss * section[term] for term in ("conductor_loss", "dielectric_loss")}}


MAIN_RUN = cable("RG-213/U", 31.46, loss=0.99, z0_ohm=50.3, velocity_factor=0.661)
MAST_FEED = [cable("RG-58C/U", 1.503, loss=0.98, z0_ohm=49.8), MAIN_RUN]

OFFCENTRE_FEED = [
    # 80.05 ft; its one-way delay at 20 C is 121.3 ns.
    {"z0_ohm": 49.6, "length_m": 24.40, "velocity_factor": 24.40 / (121.3e-9 * 299_792_458.0),
     "conductor_loss": 0.625, "dielectric_loss": 0.0067, "delay_tempco_ppm_per_k": -120.0},
    {"impedance_ratio": 4.0},
    {"series_inductance_h": 0.15e-6},
]  # fmt: skip

VERTICAL_FEED = [
    {"shunt_capacitance_f": 4e-12},
    cable("S-5C-FB", 18.04, loss=1.05, z0_ohm=75.8, velocity_factor=0.797),
]

ARRESTOR = [{"series_inductance_h": 1.4e-9}, {"shunt_capacitance_f": 1.6e-12}, {"series_inductance_h": 1.4e-9}]
BEAM_FEED = [
    cable("5D-2V", 2.004, loss=1.04),
    *ARRESTOR,
    # One-way delay 76.03 ns.
    cable("10D-FB", 18.03, loss=0.97, z0_ohm=49.5, velocity_factor=18.03 / (76.03e-9 * 299_792_458.0)),
]


def analyzer_of(rng: Any, noise: float, extension_s: float = 0.0) -> Analyzer:
    """The club's analyzer after a calibration: what the sheets say of it, drawn once."""
    return draw_analyzer(rng, 40.0, 36.0, 0.1, noise, extension_s)


def equal_steps(start_hz: float, stop_hz: float, points: int) -> np.ndarray:
    """Frequencies (points,), both ends included, to the whole hertz. [Hz]"""
    return np.round(np.linspace(start_hz, stop_hz, points))


def dipole_sweep(variant: str, temperature_c: float, seed: int) -> tuple[np.ndarray, np.ndarray]:
    """The dipole through the mast feed, 12 MHz to 16 MHz, as the analyzer showed it: frequencies and reflections."""
    rng = np.random.RandomState(seed)
    frequency_hz = equal_steps(12e6, 16e6, 401)
    gamma = shack_reflection(load_antenna("dipole_20m", variant), MAST_FEED, frequency_hz, temperature_c)
    return frequency_hz, measured(gamma, frequency_hz, analyzer_of(rng, 2e-4), rng)


def dipole_files() -> dict[str, str]:
    """The dipole in spring (three files) and in winter."""
    frequency_hz, gamma = dipole_sweep("nominal", SPRING_C, seed=2604)
    spring = touchstone_text(
        frequency_hz, gamma, unit="MHz", comments=[INVENTED, "20 m dipole through the mast feed, 2026-04-18, 11 C"]
    )
    lines = spring.splitlines()
    cut = [f"! {INVENTED}", "! deliberately damaged: the file ends in the middle of a record", *lines[2:240]]
    tenth = slice(None, None, 10)
    impedance = 50 * (1 + gamma[tenth]) / (1 - gamma[tenth])
    columns = {"Frequency (MHz)": frequency_hz[tenth] / 1e6, "R (ohm)": impedance.real, "X (ohm)": impedance.imag}
    notebook = delimited_text(
        columns, formats=(".3f", ".2f", ".2f"), delimiter=";", decimal=",",
        preamble=[f"# {INVENTED}", "# 20 m dipole through the mast feed, 2026-04-18"],
    )  # fmt: skip
    frequency_hz, gamma = dipole_sweep("iced", WINTER_C, seed=2611)
    comments = [INVENTED, "20 m dipole through the mast feed, 2026-11-28, -4.5 C, glaze on the wire"]
    return {
        "dipole_20m_spring.s1p": spring,
        "dipole_20m_spring_notebook.csv": notebook,
        "dipole_20m_cut_short.s1p": "\n".join([*cut, lines[240][:14]]),
        "dipole_20m_winter.s1p": touchstone_text(frequency_hz, gamma, unit="Hz", form="MA", comments=comments),
    }


def offcentre_files() -> dict[str, str]:
    """The off-centre-fed dipole, 1 MHz to 30 MHz, as version 2.0."""
    rng = np.random.RandomState(2605)
    frequency_hz = equal_steps(1e6, 30e6, 1001)
    gamma = shack_reflection(load_antenna("offcentre_dipole"), OFFCENTRE_FEED, frequency_hz, SPRING_C)
    gamma = measured(gamma, frequency_hz, analyzer_of(rng, 3e-4), rng)
    comments = [INVENTED, "off-centre-fed dipole, 2026-04-18, 11 C"]
    return {"offcentre_dipole.ts": touchstone_2_text(frequency_hz, gamma, unit="MHz", comments=comments)}


def vertical_files() -> dict[str, str]:
    """The 40 m vertical through 75-ohm cable, saved in decibels, referred to 75 ohm, with a port extension set."""
    rng = np.random.RandomState(2607)
    frequency_hz = equal_steps(6.4e6, 7.8e6, 281)
    gamma = shack_reflection(load_antenna("vertical_40m"), VERTICAL_FEED, frequency_hz, SUMMER_C, 75.0)
    gamma = measured(gamma, frequency_hz, analyzer_of(rng, 2e-4, extension_s=0.25e-9), rng)
    comments = [INVENTED, "40 m vertical, 2026-07-04, 29 C, port extension 0.25 ns"]
    text = touchstone_text(frequency_hz, gamma, unit="kHz", form="DB", reference_ohm=75.0, comments=comments)
    return {"vertical_40m.s1p": text}


def beam_files() -> dict[str, str]:
    """The 2 m beam, and the arrestor in its run as a two-port."""
    rng = np.random.RandomState(2608)
    frequency_hz = equal_steps(140e6, 150e6, 401)
    gamma = shack_reflection(load_antenna("beam_2m"), BEAM_FEED, frequency_hz, SUMMER_C)
    gamma = measured(gamma, frequency_hz, analyzer_of(rng, 3e-4), rng)
    comments = [INVENTED, "2 m beam, 2026-07-04, 29 C"]
    wide_hz = equal_steps(50e6, 500e6, 46)
    two_port = scattering(run_chain(wide_hz, ARRESTOR))
    arrestor_comments = [INVENTED, "arrestor of the beam's run; port 1 towards the shack"]
    return {
        "beam_2m.s1p": touchstone_text(frequency_hz, gamma, unit="Hz", form="MA", comments=comments),
        "arrestor.s2p": touchstone_text(wide_hz, two_port, unit="MHz", comments=arrestor_comments, decimals=8),
    }


def main_run_files() -> dict[str, str]:
    """The main run alone, its far end open and then shorted, in one sitting and so with one calibration."""
    rng = np.random.RandomState(2603)
    frequency_hz = equal_steps(1e6, 121e6, 401)
    analyzer = analyzer_of(rng, 2e-4)
    texts = {}
    for end in ("open", "short"):
        gamma = measured(shack_reflection(end, [MAIN_RUN], frequency_hz, SPRING_C), frequency_hz, analyzer, rng)
        comments = [INVENTED, f"main run of the mast feed alone, far end {end}, 2026-04-11, 11 C"]
        texts[f"main_run_{end}.s1p"] = touchstone_text(frequency_hz, gamma, unit="MHz", comments=comments)
    return texts


def sample_files() -> dict[str, str]:
    """All files that this script makes: name and text."""
    return {**dipole_files(), **offcentre_files(), **vertical_files(), **beam_files(), **main_run_files()}


def write_sample_sweeps(folder: Path) -> None:
    """Write all files into a folder, as UTF-8 with newlines as they are."""
    for name, text in sample_files().items():
        (folder / name).write_bytes(text.encode())


if __name__ == "__main__":
    parser = argparse.ArgumentParser(description="Make the sample sweeps of an invented site.")
    parser.add_argument("--out", type=Path, default=HERE, help="folder to write into (default: beside this script)")
    write_sample_sweeps(parser.parse_args().out)
