"""Prints how well a two-term law describes solid coax: python -m tests.oracle.coax_figures"""

import sys
import tempfile
from pathlib import Path

from tests.oracle.coax import FIT_HZ, LOADS_OHM, PROBE_HZ, compare_impedances, compare_line, two_term_bounds


def line_table(folder):
    """Loss, velocity and Zc at the fitted points, per cent, each beside its bound."""
    found, bounds = compare_line(folder, FIT_HZ), two_term_bounds(FIT_HZ)
    heads = ("MHz", 6), ("loss %", 9), ("bound", 8), ("velocity %", 12), ("bound", 9), ("|Zc| %", 9), ("bound", 9)
    yield "".join(f"{head:>{width}}" for head, width in heads) + f"{'coax slower by %':>18}"
    for k, f in enumerate(FIT_HZ):
        yield (
            f"{f / 1e6:6.0f}{100 * found['loss'][k]:9.3f}{100 * bounds['loss']:8.2f}"
            f"{100 * found['velocity'][k]:12.4f}{100 * bounds['velocity'][k]:9.4f}"
            f"{100 * found['z_c'][k]:9.4f}{100 * bounds['z_c'][k]:9.4f}{100 * found['slowness'][k]:18.3f}"
        )


def load_table(folder):
    """Error of the de-embedded impedance, per cent, with its bound."""
    found, bounds = compare_impedances(folder, PROBE_HZ)
    yield f"{'load, ohm':>14}" + "".join(f"{f / 1e6:8.0f} MHz {'bound':>7}" for f in PROBE_HZ)
    for load, errors, limits in zip(LOADS_OHM, found, bounds, strict=True):
        yield f"{load!s:>14}" + "".join(f"{100 * e:12.3f} {100 * b:7.2f}" for e, b in zip(errors, limits, strict=True))


def main():
    """Print both tables."""
    with tempfile.TemporaryDirectory() as folder:
        lines = [*line_table(Path(folder)), "", *load_table(Path(folder))]
    sys.stdout.write("\n".join(lines) + "\n")


if __name__ == "__main__":
    main()
