"""What the oracle is told: the sections of a run in plain numbers, and the errors it may be asked to make."""

from dataclasses import dataclass, field

FLAWS = {
    "no skin reactance": "the skin effect's resistance without its reactance",
    "floor with skin reactance": "the floor term given a reactance like the skin effect's",
    "no conductance": "the dielectric term left out of Y'",
    "conductance doubled": "G = 4 a_d / Z_n",
    "no temperature": "s(T) = 1",
    "temperature squared": "the conductor term scaled by s(T)^2",
    "floor scaled once": "the floor term scaled by s(T)",
    "dielectric warmed": "the dielectric term scaled by s(T)",
    "delay tempco sign": "the delay falls where it should rise",
    "wrong time factor": "exp(-j w t) inside the run",
    "sections reversed": "the first section at the antenna",
    "round speed of light": "c = 3e8 m/s",
    "rounded neper": "1 Np = 8.686 dB in the loss constant",
    "feet for metres": "loss per 100 ft taken as loss per 100 m",
    "transformer upside down": "impedance ratio read as shack : antenna",
    "series capacitor sign": "+j / (w C) in series",
    "shunt capacitor sign": "-j w C in parallel",
    "two-port reversed": "port 1 at the antenna",
    "two-port reference ignored": "the two-port's waves taken in the sweep's reference",
    "total loss from reflections": "10 log10((1 - |G_in|^2)/(1 - |G_ant|^2)) + matched loss",
    "matched loss from the law": "the asymptote in place of the true attenuation",
    "electrical length from velocity": "w l / (2 pi v c), the loss's part left out",
}


@dataclass(frozen=True)
class Cable:
    """A uniform cable: high-frequency z0, velocity factor or one-way delay, loss terms in dB/100 m at 20 C."""

    z0_ohm: float
    length_m: float
    velocity_factor: float | None = None
    delay_ns: float | None = None
    conductor_loss: float = 0.0
    dielectric_loss: float = 0.0
    floor_loss: float = 0.0
    delay_tempco_ppm_per_k: float = 0.0


@dataclass(frozen=True)
class Series:
    """Lumped elements in series with each other and with the run: ohm, H, F; None where there is none."""

    resistance_ohm: float | None = None
    inductance_h: float | None = None
    capacitance_f: float | None = None


@dataclass(frozen=True)
class Shunt:
    """Lumped elements in parallel with each other, across the run: ohm, H, F; None where there is none."""

    resistance_ohm: float | None = None
    inductance_h: float | None = None
    capacitance_f: float | None = None


@dataclass(frozen=True)
class Transformer:
    """An ideal transformer; `impedance_ratio` is antenna side : shack side."""

    impedance_ratio: float


@dataclass(frozen=True)
class TwoPort:
    """A measured two-port, port 1 at the shack end: ((S11, S12), (S21, S22)) per frequency, and their reference."""

    reference_ohm: float
    s_at: dict = field(hash=False)
