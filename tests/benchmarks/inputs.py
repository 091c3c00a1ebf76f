"""The sweep and the run sheet that every benchmark uses: 1,001 points, two sections."""

from pathlib import Path

import numpy as np

SHEET = """\
[[section]]
name = "patch lead"
z0_ohm = 50.0
velocity_factor = 0.66
conductor_loss = 1.4
dielectric_loss = 0.02
length_m = 1.5

[[section]]
name = "main run"
z0_ohm = 50.0
velocity_factor = 0.84
conductor_loss = 0.4
dielectric_loss = 0.0025
length_m = 31.5
"""


def write_inputs(folder: Path, points: int = 1001) -> tuple[Path, Path]:
    """Write sweep and run sheet; a series resonant circuit behind nothing, which is as good as any for timing."""
    frequency = np.linspace(10e6, 20e6, points)
    impedance = 60.0 * (1.0 + 12j * (frequency / 14.1e6 - 14.1e6 / frequency))
    gamma = 0.8 * (impedance - 50.0) / (impedance + 50.0) * np.exp(-4e-6j * frequency)
    sweep, sheet = folder / "sweep.s1p", folder / "run.toml"
    rows = "".join(f"{f:.0f} {g.real:.9f} {g.imag:.9f}\n" for f, g in zip(frequency, gamma, strict=True))
    sweep.write_text("# Hz S RI R 50\n" + rows, encoding="ascii")
    sheet.write_text(SHEET, encoding="ascii")
    return sweep, sheet
