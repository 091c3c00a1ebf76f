"""
Impedance tables of four antennas, computed with the method-of-moments engine nec2c.

Writes, beside this file, a deck (`.nec`) and a table (`.csv`: frequency_hz, resistance_ohm, reactance_ohm) for every
antenna and every change of it. Run once by hand; the tables are kept, so nothing that uses them needs the engine:

    python make_antennas.py             write all decks and tables
    python make_antennas.py beam_2m     only this one
    python make_antennas.py --check     print what README.md says about convergence, average gain and spline error

The method of moments of NEC-2 knows no dielectric sleeve, so ice is put in as two equivalents, derived as follows.
A wire of radius a under ice out to radius b, both thin against the wavelength: the ice changes the radial electric
field between a and b (it is 1/eps_r of what it was) and no magnetic field. The potential that a charge per length q
produces on the wire falls by q/(2 pi eps_0) (1 - 1/eps_r) ln(b/a). A bare wire of the larger radius

    a_equivalent = a (b/a)^(1 - 1/eps_r)

has exactly that potential, but its magnetic field begins at a_equivalent instead of a, so the inductance per length

    L_sleeve = mu_0/(2 pi) (1 - 1/eps_r) ln(b/a)

is missing and is added as a distributed series load. The conductivity is multiplied by (a/a_equivalent)^2, which
keeps the skin-effect resistance per length, proportional to 1/(radius sqrt(conductivity)), that of the wire inside.
Ice is taken as lossless.
"""

import argparse
import math
import re
import subprocess
import tempfile
from collections.abc import Callable
from dataclasses import dataclass
from pathlib import Path

import numpy as np
from scipy.interpolate import CubicSpline

HERE = Path(__file__).resolve().parent
REFERENCE_OHM = 50.0

COPPER_S_PER_M = 5.8e7  # annealed copper at 20 C, IEC 60028
ALUMINIUM_S_PER_M = 2.5e7  # usual tube alloys, rounded; the beam's loss is about 1 % either way
ICE_PERMITTIVITY = 3.17  # pure ice far above its relaxation near 10 kHz and far below the infra-red
ICE_THICKNESS_M = 0.001  # radial glaze

# Relative permittivity and conductivity [S/m]: "average" and "very good" (rich wet soil) in the usual tables of ground.
AVERAGE_GROUND = (13.0, 0.005)
# (Permittivity 30 with 0.02 S/m makes the engine's ground solution jump by 2 % at 6.9 MHz.)
WET_GROUND = (20.0, 0.03)


@dataclass(frozen=True)
class Wire:
    """A straight wire from `start` to `end` [m], cut into equal `segments`."""

    start: tuple[float, float, float]
    end: tuple[float, float, float]
    segments: int


@dataclass(frozen=True)
class Antenna:
    """
    An antenna, its source and the frequencies of its table.

    `wires(scale)` gives the conductors with their lengths multiplied by `scale` (heights and boom positions stay);
    the source sits on segment `source_segment` of wire `source_wire`, both counted from 1.
    """

    name: str
    title: str
    wires: Callable[[float], list[Wire]]
    source_wire: int
    source_segment: int
    radius_m: float
    conductivity_s_per_m: float
    start_mhz: float
    step_mhz: float
    points: int
    band_mhz: tuple[float, float]


@dataclass(frozen=True)
class Variant:
    """A change made to an antenna: lengths, ice on every conductor, ground constants."""

    name: str
    scale: float = 1.0
    ice_m: float = 0.0
    ground: tuple[float, float] = AVERAGE_GROUND


VARIANTS = (
    Variant("nominal"),
    Variant("longer", scale=1.01),
    Variant("iced", ice_m=ICE_THICKNESS_M),
    Variant("wet_ground", ground=WET_GROUND),
)


def dipole_20m(scale: float) -> list[Wire]:
    """Half-wave dipole for 14.1 MHz, 12.5 m up."""
    half = 5.14 * scale
    return [Wire((0, -half, 12.5), (0, half, 12.5), 31)]


def vertical_40m(scale: float) -> list[Wire]:
    """Quarter-wave wire on a pole for 7.1 MHz, base at 5 m, four radials that slope down to 2.5 m."""
    up = 10.45 * scale
    out = math.sqrt(10.45**2 - 2.5**2) * scale
    foot = 5 - 2.5 * scale
    ends = [(out, 0, foot), (0, out, foot), (-out, 0, foot), (0, -out, foot)]
    return [Wire((0, 0, 5), (0, 0, 5 + up), 31)] + [Wire((0, 0, 5), end, 31) for end in ends]


def offcentre_dipole(scale: float) -> list[Wire]:
    """Wire of 41.7 m, 12 m up, fed 33 % along: half wave on 3.5 MHz, usable on its even harmonics."""
    half = 20.85 * scale
    return [Wire((0, -half, 12), (0, half, 12), 123)]


# Position on the boom and length of each element [m], from the rear: reflector, driven element, two directors.
BEAM_ELEMENTS = ((0.0, 1.016), (0.310, 0.962), (0.550, 0.921), (1.000, 0.901))


def beam_2m(scale: float) -> list[Wire]:
    """Four-element beam for 145 MHz on a 1 m boom, 12 m up; the driven element is a split dipole."""
    return [Wire((x, -length * scale / 2, 12), (x, length * scale / 2, 12), 41) for x, length in BEAM_ELEMENTS]


ANTENNAS = (
    Antenna(
        "dipole_20m", "Half-wave wire dipole, 20 m band", dipole_20m, 1, 16, 0.001, COPPER_S_PER_M,
        3.0, 0.05, 541, (13.0, 15.5),
    ),
    Antenna(
        "vertical_40m", "Quarter-wave wire vertical with four elevated radials, 40 m band", vertical_40m, 1, 1,
        0.001, COPPER_S_PER_M, 3.0, 0.05, 541, (6.5, 7.8),
    ),
    Antenna(
        "offcentre_dipole", "Off-centre-fed wire dipole, 80 m to 10 m bands", offcentre_dipole, 1, 41,
        0.001, COPPER_S_PER_M, 1.0, 0.025, 1161, (3.4, 30.0),
    ),
    Antenna(
        "beam_2m", "Four-element beam, 2 m band", beam_2m, 2, 21, 0.004, ALUMINIUM_S_PER_M,
        135.0, 0.05, 401, (143.0, 147.0),
    ),
)  # fmt: skip


def deck_text(antenna: Antenna, variant: Variant, start_mhz: float, step_mhz: float, points: int,
              refine: int = 1, lossless_in_free_space: bool = False) -> str:  # fmt: skip
    """The deck: geometry, wire loss and ice, ground, frequencies, source. `refine` multiplies the segments."""
    share = 1 - 1 / ICE_PERMITTIVITY
    growth = (1 + variant.ice_m / antenna.radius_m) ** share
    sleeve_h_per_m = 2e-7 * share * math.log(1 + variant.ice_m / antenna.radius_m)
    wires = antenna.wires(variant.scale)
    lines = [f"CM {antenna.title}: {variant.name}", "CE lengths in metres, frequencies in MHz"]
    for tag, wire in enumerate(wires, start=1):
        place = " ".join(f"{value:.5f}" for value in (*wire.start, *wire.end))
        lines.append(f"GW {tag} {wire.segments * refine} {place} {antenna.radius_m * growth:.7f}")
    lines.append("GE 0")
    if lossless_in_free_space:
        lines.append("GN -1")
    else:
        lines.append(f"LD 5 0 0 0 {antenna.conductivity_s_per_m / growth**2:.5E}")
        if variant.ice_m:
            lines.append(f"LD 2 0 0 0 0 {sleeve_h_per_m:.5E} 0")
        lines.append(f"GN 2 0 0 0 {variant.ground[0]:g} {variant.ground[1]:g}")
    # With an odd refinement this segment has the centre of the unrefined one.
    source = refine * (antenna.source_segment - 1) + (refine + 1) // 2
    lines.append(f"FR 0 {points} 0 0 {start_mhz:.6f} {step_mhz:.6f}")
    lines.append(f"EX 0 {antenna.source_wire} {source} 0 1 0")
    lines.append("PT -1")
    # The full sphere in 5 degree steps, averaged, nothing printed but the average.
    lines.append("RP 0 37 73 1002 0 0 5 5" if lossless_in_free_space else "XQ")
    return "\n".join([*lines, "EN", ""])


def run_engine(deck: str) -> str:
    """The engine's printed output for a deck."""
    with tempfile.TemporaryDirectory() as folder:
        (Path(folder) / "deck.nec").write_text(deck)
        subprocess.run(["nec2c", "-i", "deck.nec", "-o", "deck.out"], cwd=folder, check=True)
        return (Path(folder) / "deck.out").read_text()


def impedances_in(output: str) -> np.ndarray:
    """The source's impedance at every frequency, shape (F,). [ohm]"""
    rows = re.findall(r"ANTENNA INPUT PARAMETERS -+\n.*\n.*\n(.*)\n", output)
    values = [row.split() for row in rows]
    return np.array([complex(float(value[6]), float(value[7])) for value in values])


def write_antenna(antenna: Antenna, variant: Variant) -> None:
    """Write the deck and the table of one antenna with one change."""
    deck = deck_text(antenna, variant, antenna.start_mhz, antenna.step_mhz, antenna.points)
    impedance = impedances_in(run_engine(deck))
    if len(impedance) != antenna.points:
        raise RuntimeError(f"{antenna.name} {variant.name}: {len(impedance)} impedances, expected {antenna.points}")
    step_hz = round(antenna.step_mhz * 1e6)
    frequency_hz = round(antenna.start_mhz * 1e6) + step_hz * np.arange(antenna.points)
    rows = [f"{f},{z.real:g},{z.imag:g}" for f, z in zip(frequency_hz, impedance, strict=True)]
    stem = f"{antenna.name}_{variant.name}"
    (HERE / f"{stem}.nec").write_text(deck)
    (HERE / f"{stem}.csv").write_text("\n".join(["frequency_hz,resistance_ohm,reactance_ohm", *rows, ""]))


def reflection(impedance: np.ndarray) -> np.ndarray:
    """Reflection of an impedance at 50 ohm."""
    return (impedance - REFERENCE_OHM) / (impedance + REFERENCE_OHM)


def print_checks(antenna: Antenna, variant: Variant) -> None:
    """Print one line: worst spline error between table points, effect of three times the segments, average gain."""
    table = np.loadtxt(HERE / f"{antenna.name}_{variant.name}.csv", delimiter=",", skiprows=1)
    spline = CubicSpline(table[:, 0], reflection(table[:, 1] + 1j * table[:, 2]))
    halfway = deck_text(antenna, variant, antenna.start_mhz + antenna.step_mhz / 2, antenna.step_mhz,
                        antenna.points - 1)  # fmt: skip
    between = reflection(impedances_in(run_engine(halfway)))
    spline_error = np.abs(spline((table[1:, 0] + table[:-1, 0]) / 2) - between).max()
    low, high = antenna.band_mhz
    coarse, fine = (
        reflection(impedances_in(run_engine(deck_text(antenna, variant, low, (high - low) / 40, 41, refine))))
        for refine in (1, 3)
    )
    gain_deck = deck_text(antenna, variant, (low + high) / 2, 1, 1, lossless_in_free_space=True)
    gain = float(re.search(r"AVERAGE POWER GAIN[:\s=]*([-+.\dE]+)", run_engine(gain_deck)).group(1))
    print(f"{antenna.name:17} {variant.name:11} spline {spline_error:.1e}   "
          f"three times the segments {np.abs(fine - coarse).max():.4f}   average gain {gain:.4f}")  # fmt: skip


def main() -> None:
    """Write all tables, or print the checks."""
    parser = argparse.ArgumentParser(description="Compute the antenna tables with nec2c.")
    parser.add_argument("--check", action="store_true", help="print the checks of the tables that are there")
    parser.add_argument("names", nargs="*", help="antennas (default: all)")
    options = parser.parse_args()
    action = print_checks if options.check else write_antenna
    for antenna in ANTENNAS:
        for variant in VARIANTS:
            if not options.names or antenna.name in options.names:
                action(antenna, variant)


if __name__ == "__main__":
    main()
