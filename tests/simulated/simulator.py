"""
What an analyzer at the shack end shows of an antenna, simulated without any code of the package.

An antenna (a table of impedances from a method-of-moments engine, see antennas/README.md) is carried through a run by
solving the telegrapher's equations as a matrix exponential, and then seen through an analyzer's residual errors.

Conventions: SI units, time factor exp(+j w t), reflection (Z - R)/(Z + R), R real. Frequency is the last axis, (F,).
Every figure of a section may also be an array (T, 1); results then have shape (T, F).

A run is plain data: a list of dicts, the first at the shack end. A section has one of these sets of keys
(`name` may be added to any; an unknown or missing key is an error):

cable        z0_ohm, velocity_factor, length_m, conductor_loss, dielectric_loss;
             optional: floor_loss, temperature_c (else that of the run), delay_tempco_ppm_per_k
lumped       any of series_resistance_ohm, series_inductance_h, series_capacitance_f (in series with each other), or
             any of shunt_resistance_ohm, shunt_inductance_h, shunt_capacitance_f (in parallel with each other)
transformer  impedance_ratio: antenna side over shack side, ideal
contact      contact_resistance_ohm; optional: contact_capacitance_f across that resistance, contact_inductance_h in
             series with both: a corroded film bridged by its own capacitance, and the detour that the current takes

Example: what a dipole looks like through 31.5 m of cable, measured by an analyzer of 40 dB directivity::

    antenna = load_antenna("dipole_20m")
    gamma = shack_reflection(antenna, run, frequency_hz, temperature_c=12.0)
    rng = np.random.RandomState(1)
    analyzer = draw_analyzer(rng, directivity_db=40.0, source_match_db=36.0, tracking_db=0.1, noise=2e-4)
    sweep = measured(gamma, frequency_hz, analyzer, rng)
"""

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from pathlib import Path
from typing import Any

import numpy as np
from scipy.interpolate import CubicSpline

SPEED_OF_LIGHT = 299_792_458.0  # m/s
DB_PER_100M_PER_NEPER_PER_M = 100 * 20 / np.log(10)
COPPER_PER_K = 0.00393  # temperature coefficient of the resistivity of annealed copper at 20 C, IEC 60028
TABLES = Path(__file__).resolve().parent / "antennas"
TABLE_REFERENCE_OHM = 50.0

Section = Mapping[str, Any]
Run = Sequence[Section]

SERIES_KEYS = ("series_resistance_ohm", "series_inductance_h", "series_capacitance_f")
SHUNT_KEYS = ("shunt_resistance_ohm", "shunt_inductance_h", "shunt_capacitance_f")
CABLE_KEYS = ("z0_ohm", "velocity_factor", "length_m", "conductor_loss", "dielectric_loss")
CABLE_OPTIONS = ("floor_loss", "temperature_c", "delay_tempco_ppm_per_k")
CONTACT_OPTIONS = ("contact_capacitance_f", "contact_inductance_h")


# ---- antennas ------------------------------------------------------------------------------------------------------


@dataclass(frozen=True, eq=False)
class Antenna:
    """The reflection of an antenna at 50 ohm, `gamma` (N,), at the frequencies of its table, (N,). [Hz]"""

    name: str
    variant: str
    frequency_hz: np.ndarray
    gamma: np.ndarray


def load_antenna(name: str, variant: str = "nominal") -> Antenna:
    """Read a table from antennas/, such as load_antenna("dipole_20m", "iced")."""
    frequency_hz, resistance, reactance = np.loadtxt(TABLES / f"{name}_{variant}.csv", delimiter=",", skiprows=1).T
    impedance = resistance + 1j * reactance
    gamma = (impedance - TABLE_REFERENCE_OHM) / (impedance + TABLE_REFERENCE_OHM)
    return Antenna(name, variant, frequency_hz, gamma)


def terminal_state(termination: "Antenna | complex | str", frequency_hz: np.ndarray) -> tuple[np.ndarray, np.ndarray]:
    """
    Voltage and current into a termination, to a common scale, each of shape (F,). [V, A]

    The termination is an antenna, "open", "short", or an impedance [ohm] (a number or (F,)). A pair of voltage and
    current has no infinities for open or short. Antennas are interpolated as reflections, by a cubic spline.
    """
    if isinstance(termination, str):
        voltage = {"open": 1.0, "short": 0.0}[termination]
        return np.full(len(frequency_hz), voltage + 0j), np.full(len(frequency_hz), 1 - voltage + 0j)
    if isinstance(termination, Antenna):
        table = termination.frequency_hz
        if frequency_hz.min() < table[0] or frequency_hz.max() > table[-1]:
            raise ValueError(f"{termination.name}: the table covers {table[0]:g} Hz to {table[-1]:g} Hz")
        gamma = CubicSpline(table, termination.gamma)(frequency_hz)
        return 1 + gamma, (1 - gamma) / TABLE_REFERENCE_OHM
    return termination + np.zeros(len(frequency_hz), complex), np.ones(len(frequency_hz), complex)


def antenna_impedance(antenna: Antenna, frequency_hz: np.ndarray) -> np.ndarray:
    """The true impedance at the antenna terminals, (F,). [ohm]"""
    voltage, current = terminal_state(antenna, frequency_hz)
    return voltage / current


# ---- cables: the telegrapher's equations ---------------------------------------------------------------------------


def per_metre(frequency_hz: np.ndarray, cable: Section, temperature_c: float = 20.0) -> tuple[np.ndarray, np.ndarray]:
    """
    Series impedance [ohm/m] and shunt admittance [S/m] of a cable, shape (F,) or (T, F).

    The cable is described by its high-frequency resistance Z, its velocity v c and the loss
    floor_loss + conductor_loss sqrt(f_MHz) + dielectric_loss f_MHz, in dB/100 m at 20 C.

    A loss of a nepers per metre that comes from series resistance alone takes R = 2 Z a, one that comes from shunt
    conductance alone takes G = 2 a / Z (each true in the limit of small loss). The floor and conductor terms are
    resistance, the dielectric term is conductance. In the skin effect the field in the metal lags by 45 degrees,
    so the conductor term's reactance equals its resistance and adds to w L; the floor, a direct current through the
    whole cross-section, has none. L = Z/(v c) and C = 1/(Z v c) are those of the ideal line.

    Temperature acts on the metal: resistivity grows by 0.393 % per kelvin. Skin-effect resistance goes with its
    square root, the floor with the resistivity itself. The delay grows by delay_tempco_ppm_per_k, shared equally by
    L and C.
    """
    temperature_c = cable.get("temperature_c", temperature_c)
    resistivity = 1 + COPPER_PER_K * (temperature_c - 20.0)
    mhz = frequency_hz / 1e6
    floor = cable.get("floor_loss", 0.0) * resistivity / DB_PER_100M_PER_NEPER_PER_M
    conductor = cable["conductor_loss"] * np.sqrt(mhz * resistivity) / DB_PER_100M_PER_NEPER_PER_M
    dielectric = cable["dielectric_loss"] * mhz / DB_PER_100M_PER_NEPER_PER_M
    slowness = 1 / (cable["velocity_factor"] * SPEED_OF_LIGHT)
    slowness = slowness * (1 + cable.get("delay_tempco_ppm_per_k", 0.0) * 1e-6 * (temperature_c - 20.0))
    z0, w = cable["z0_ohm"], 2 * np.pi * frequency_hz
    series = 2 * z0 * (floor + conductor) + 1j * (w * z0 * slowness + 2 * z0 * conductor)
    shunt = 2 * dielectric / z0 + 1j * w * slowness / z0
    return series, shunt


def matrix_exponential(matrix: np.ndarray) -> np.ndarray:
    """
    exp(M) of a stack of square matrices (..., n, n), by scaling and squaring a Taylor series.

    M is halved until its norm is at most 1/2, where the series cut after the 16th power errs by 0.5^17/17! = 2e-20.
    Every squaring doubles the rounding error: for a phase of 150 rad, nine squarings, about 1e-13.
    """
    norm = np.abs(matrix).sum(axis=-1).max()
    halvings = max(0, int(np.ceil(np.log2(norm / 0.5)))) if norm > 0 else 0
    small = matrix / 2.0**halvings
    term = np.broadcast_to(np.eye(matrix.shape[-1], dtype=complex), matrix.shape)
    total = term.copy()
    for power in range(1, 17):
        term = term @ small / power
        total = total + term
    for _ in range(halvings):
        total = total @ total
    return total


def matrix(a: Any, b: Any, c: Any, d: Any) -> np.ndarray:
    """The stack of 2x2 matrices [[a, b], [c, d]] from four arrays that broadcast."""
    a, b, c, d = np.broadcast_arrays(a, b, c, d)
    return np.stack([np.stack([a, b], axis=-1), np.stack([c, d], axis=-1)], axis=-2).astype(complex)


def cable_chain(frequency_hz: np.ndarray, cable: Section, temperature_c: float) -> np.ndarray:
    """
    Chain matrix of a cable: (V, I) at its shack end from (V, I) at its antenna end. (..., F, 2, 2)

    dV/dx = -Z' I and dI/dx = -Y' V have the solution exp([[0, Z'], [Y', 0]] l). The current is multiplied by z0 while
    solving, so that both off-diagonal elements are about the phase in radians and the matrix is scaled no more than
    it must be.
    """
    series, shunt = per_metre(frequency_hz, cable, temperature_c)
    z0, length = cable["z0_ohm"], cable["length_m"]
    solved = matrix_exponential(matrix(0, series * length / z0, shunt * length * z0, 0))
    return matrix(solved[..., 0, 0], solved[..., 0, 1] * z0, solved[..., 1, 0] / z0, solved[..., 1, 1])


# ---- other sections and the whole run -------------------------------------------------------------------------------


def series_impedance(w: np.ndarray, section: Section) -> np.ndarray:
    """Impedance of a series section (F,). [ohm]"""
    impedance = section.get("series_resistance_ohm", 0.0) + 1j * w * section.get("series_inductance_h", 0.0)
    if "series_capacitance_f" in section:
        impedance = impedance + 1 / (1j * w * section["series_capacitance_f"])
    return impedance


def shunt_admittance(w: np.ndarray, section: Section) -> np.ndarray:
    """Admittance of a shunt section (F,). [S]"""
    admittance = 1j * w * section.get("shunt_capacitance_f", 0.0)
    if "shunt_resistance_ohm" in section:
        admittance = admittance + 1 / section["shunt_resistance_ohm"]
    if "shunt_inductance_h" in section:
        admittance = admittance + 1 / (1j * w * section["shunt_inductance_h"])
    return admittance


def contact_impedance(w: np.ndarray, section: Section) -> np.ndarray:
    """Impedance of a bad contact (F,): resistance with a capacitance across it, an inductance in series. [ohm]"""
    resistance = section["contact_resistance_ohm"]
    film = resistance / (1 + 1j * w * resistance * section.get("contact_capacitance_f", 0.0))
    return film + 1j * w * section.get("contact_inductance_h", 0.0)


def kind_of(section: Section) -> str:
    """Which of the five kinds a section is.

    Raises
    ------
    ValueError
        If its keys are not those of one kind.
    """
    keys = set(section) - {"name"}
    kinds = {
        "cable": (set(CABLE_KEYS), set(CABLE_OPTIONS)),
        "transformer": ({"impedance_ratio"}, set()),
        "contact": ({"contact_resistance_ohm"}, set(CONTACT_OPTIONS)),
        "series": (set(), set(SERIES_KEYS)),
        "shunt": (set(), set(SHUNT_KEYS)),
    }
    for kind, (needed, allowed) in kinds.items():
        if keys and needed <= keys <= needed | allowed:
            return kind
    raise ValueError(f"these keys are not those of one kind of section: {sorted(section)}")


def section_chain(frequency_hz: np.ndarray, section: Section, temperature_c: float = 20.0) -> np.ndarray:
    """Chain matrix of one section, (..., F, 2, 2)."""
    w = 2 * np.pi * frequency_hz
    kind = kind_of(section)
    if kind == "cable":
        return cable_chain(frequency_hz, section, temperature_c)
    if kind == "transformer":
        turns = np.sqrt(section["impedance_ratio"]) + 0 * w
        return matrix(1 / turns, 0, 0, turns)
    if kind == "shunt":
        return matrix(1, 0, shunt_admittance(w, section), 1)
    return matrix(1, (contact_impedance if kind == "contact" else series_impedance)(w, section), 0, 1)


def run_chain(frequency_hz: np.ndarray, run: Run, temperature_c: float = 20.0) -> np.ndarray:
    """Chain matrix of a run, shack end first, (..., F, 2, 2)."""
    total = np.broadcast_to(np.eye(2, dtype=complex), (len(frequency_hz), 2, 2))
    for section in run:
        total = total @ section_chain(frequency_hz, section, temperature_c)
    return total


def shack_reflection(
    termination: Antenna | complex | str,
    run: Run,
    frequency_hz: np.ndarray,
    temperature_c: float = 20.0,
    reference_ohm: float = 50.0,
) -> np.ndarray:
    """True reflection at the shack end, of a run that ends in an antenna, an impedance, "open" or "short". (..., F)"""
    voltage, current = terminal_state(termination, frequency_hz)
    chain = run_chain(frequency_hz, run, temperature_c)
    shack_voltage = chain[..., 0, 0] * voltage + chain[..., 0, 1] * current
    shack_current = chain[..., 1, 0] * voltage + chain[..., 1, 1] * current
    return (shack_voltage - reference_ohm * shack_current) / (shack_voltage + reference_ohm * shack_current)


def scattering(chain: np.ndarray, reference_ohm: float = 50.0) -> np.ndarray:
    """S-parameters (..., F, 2, 2) of a chain matrix, both ports at one reference; port 1 is the shack end."""
    a, b, c, d = chain[..., 0, 0], chain[..., 0, 1] / reference_ohm, chain[..., 1, 0] * reference_ohm, chain[..., 1, 1]
    s = matrix(a + b - c - d, 2 * (a * d - b * c), 2, -a + b - c + d)
    return s / (a + b + c + d)[..., np.newaxis, np.newaxis]


# ---- the analyzer ----------------------------------------------------------------------------------------------------


@dataclass(frozen=True)
class Analyzer:
    """
    Residual errors of a calibrated analyzer: the same for all frequencies and for all sweeps of one calibration.

    `noise` is the standard deviation of each of real and imaginary part, drawn anew for every point. `extension_s`
    is a port extension (one-way electrical delay) that the operator set.
    """

    directivity: complex = 0.0
    source_match: complex = 0.0
    tracking: complex = 0.0
    noise: float = 0.0
    extension_s: float = 0.0


# 95 % of the magnitudes of a circular normal number are below this many standard deviations of one component.
CIRCULAR_95 = float(np.sqrt(-2 * np.log(0.05)))


def draw_analyzer(
    rng: Any,
    directivity_db: float,
    source_match_db: float,
    tracking_db: float,
    noise: float = 0.0,
    extension_s: float = 0.0,
) -> Analyzer:
    """
    An analyzer whose error terms are circular normal, their magnitudes within the stated limits in 95 % of draws.

    The limits: 10^(-directivity_db/20), 10^(-source_match_db/20), 10^(tracking_db/20) - 1. `rng` is a numpy
    generator, old or new style; the old RandomState keeps its numbers through all versions of numpy.
    """
    limits = (10 ** (-directivity_db / 20), 10 ** (-source_match_db / 20), 10 ** (tracking_db / 20) - 1)
    parts = rng.standard_normal((3, 2))
    terms = [complex(x, y) * limit / CIRCULAR_95 for (x, y), limit in zip(parts, limits, strict=True)]
    return Analyzer(*terms, noise=noise, extension_s=extension_s)


def measured(gamma: np.ndarray, frequency_hz: np.ndarray, analyzer: Analyzer, rng: Any = None) -> np.ndarray:
    """
    The reflection that the analyzer shows, (..., F): D + (1 + T) gamma/(1 - M gamma) + noise, then port extension.

    A port extension moves the shown plane away from the analyzer: it multiplies by exp(+j 2 w extension).
    """
    shown = analyzer.directivity + (1 + analyzer.tracking) * gamma / (1 - analyzer.source_match * gamma)
    if analyzer.noise:
        parts = rng.standard_normal((2, *np.shape(shown)))
        shown = shown + analyzer.noise * (parts[0] + 1j * parts[1])
    return shown * np.exp(2j * 2 * np.pi * frequency_hz * analyzer.extension_s)
