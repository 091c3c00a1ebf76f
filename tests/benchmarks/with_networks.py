import sys
import tomllib

import numpy as np
import skrf as rf
from rich.console import Console
from rich.table import Table
from skrf.media import DefinedGammaZ0

antenna = rf.Network(sys.argv[1])
with open(sys.argv[2], "rb") as file:
    sections = tomllib.load(file)["section"]
for s in sections:
    megahertz = antenna.f / 1e6
    loss = (s["conductor_loss"] * np.sqrt(megahertz) + s["dielectric_loss"] * megahertz) / 868.589
    gamma = loss + 2j * np.pi * antenna.f / (299792458.0 * s["velocity_factor"])
    media = DefinedGammaZ0(antenna.frequency, z0=s["z0_ohm"], gamma=gamma, z0_port=50.0)
    antenna = media.line(s["length_m"], "m").inv ** antenna
table = Table("MHz", "R ohm", "X ohm", "SWR")
for f, z, swr in zip(antenna.f, antenna.z[:, 0, 0], antenna.s_vswr[:, 0, 0]):
    table.add_row(f"{f / 1e6:.4f}", f"{z.real:.1f}", f"{z.imag:.1f}", f"{swr:.2f}")
Console().print(table)
