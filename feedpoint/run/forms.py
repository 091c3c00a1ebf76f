"""
The keys of run sheet and catalogue, with what each may hold: the forms that a file is checked against.

Only shapes and ranges are checked here; what keys mean together is decided where a run is built.
"""

from typing import Annotated

from pydantic import BaseModel, ConfigDict, Field

# The ranges are wide for anything that exists, and narrow enough that no figure overflows on its way.
Positive = Annotated[float, Field(gt=0, le=1e12)]
NotNegative = Annotated[float, Field(ge=0, le=1e12)]
Megahertz = Annotated[float, Field(ge=1e-6, le=1e6)]
Loss = Annotated[float, Field(ge=1e-6, le=1e5)]
LossTerm = Annotated[float, Field(ge=0, le=1e5)]
Resistance = Annotated[float, Field(ge=0.01, le=10_000)]
VelocityFactor = Annotated[float, Field(ge=0.001, le=1)]
Henry = Annotated[float, Field(ge=1e-15, le=1e3)]
Farad = Annotated[float, Field(ge=1e-18, le=1.0)]
Text = Annotated[str, Field(min_length=1)]


class Form(BaseModel):
    """A table whose keys are all known and whose numbers are finite numbers, not texts or truth values."""

    # Built when first used: a command needs few of the forms, and each takes a millisecond.
    model_config = ConfigDict(extra="forbid", strict=True, allow_inf_nan=False, frozen=True, defer_build=True)


class LossPoint(Form):
    """A printed attenuation: `mhz` with `db_per_100m` or `db_per_100ft`."""

    mhz: Megahertz
    db_per_100m: Loss | None = None
    db_per_100ft: Loss | None = None


class PowerPoint(Form):
    """A power rating: `w` [W] at `mhz`."""

    mhz: Megahertz
    w: Positive


class LossKeys(Form):
    """The keys that give a loss law: points, or the three terms [dB/100 m, f in MHz]."""

    loss: Annotated[list[LossPoint], Field(min_length=1)] | None = None
    conductor_loss: LossTerm | None = None
    dielectric_loss: LossTerm | None = None
    floor_loss: LossTerm | None = None
    steel_core: bool | None = None
    max_voltage_rms_v: Positive | None = None
    max_power_w: Annotated[list[PowerPoint], Field(min_length=1)] | None = None


class CableForm(LossKeys):
    """`[[section]]` that is a length of cable."""

    name: Text | None = None
    cable: Text | None = None
    z0_ohm: Resistance | None = None
    velocity_factor: VelocityFactor | None = None
    delay_ns: Annotated[float, Field(gt=0, le=1e6)] | None = None
    length_m: Annotated[float, Field(ge=0, le=100_000)] | None = None
    length_ft: Annotated[float, Field(ge=0, le=328_000)] | None = None
    length_tolerance_m: NotNegative | None = None
    length_tolerance_ft: NotNegative | None = None
    velocity_factor_tolerance: NotNegative | None = None
    delay_tolerance_ns: NotNegative | None = None
    loss_tolerance_percent: Annotated[float, Field(ge=0, lt=100)] | None = None
    z0_tolerance_ohm: NotNegative | None = None
    delay_tempco_ppm_per_k: Annotated[float, Field(ge=-2000, le=2000)] | None = None
    delay_tempco_tolerance_ppm_per_k: NotNegative | None = None


class TwoPortForm(Form):
    """`[[section]]` that is a two-port file, port 1 at the shack end."""

    name: Text | None = None
    two_port: Text


class LumpedForm(Form):
    """`[[section]]` of lumped elements, all in series with the run or all across it."""

    name: Text | None = None
    series_resistance_ohm: NotNegative | None = None
    series_inductance_h: Annotated[float, Field(ge=0, le=1e3)] | None = None
    series_capacitance_f: Farad | None = None
    shunt_resistance_ohm: Annotated[float, Field(ge=1e-6, le=1e12)] | None = None
    shunt_inductance_h: Henry | None = None
    shunt_capacitance_f: Annotated[float, Field(ge=0, le=1.0)] | None = None


class TransformerForm(Form):
    """`[[section]]` that is an ideal transformer: impedance on the antenna side over that on the shack side."""

    name: Text | None = None
    impedance_ratio: Annotated[float, Field(ge=1e-4, le=1e4)]


class BandForm(Form):
    """`[[band]]`: what matters and what is acceptable there."""

    name: Text
    low_hz: Positive
    high_hz: Positive
    swr_limit: Annotated[float, Field(ge=1)] | None = None


class AnalyzerForm(Form):
    """`[analyzer]`: residual errors after calibration."""

    directivity_db: Positive | None = None
    source_match_db: Positive | None = None
    tracking_db: NotNegative | None = None
    noise: NotNegative | None = None
    calibration: Text | None = None
    extension_s: Annotated[float, Field(ge=-1e-3, le=1e-3)] = 0.0


class RunForm(Form):
    """`[run]`: name and conditions."""

    name: Text | None = None
    temperature_c: Annotated[float, Field(ge=-100, le=250)] | None = None
    temperature_tolerance_c: NotNegative | None = None
    cables_file: Text | None = None


class CatalogueEntryForm(LossKeys):
    """`[[cable]]` of a catalogue."""

    name: Text
    z0_ohm: Resistance
    velocity_factor: VelocityFactor
    dielectric: Text | None = None
    capacitance_pf_per_m: Positive | None = None
    delay_tempco_ppm_per_k: Annotated[float, Field(ge=-2000, le=2000)] | None = None
    sources: list[Text] = Field(default_factory=list)


# The keys that hold lists of tables, with the form of one entry.
ENTRIES: dict[str, type[Form]] = {"loss": LossPoint, "max_power_w": PowerPoint}
