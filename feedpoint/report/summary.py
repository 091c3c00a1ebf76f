"""The summary that stands above a table: what the user came for."""

from collections.abc import Iterator, Sequence
from itertools import zip_longest

from feedpoint.errors import one_line
from feedpoint.landmarks import BandReading, Landmarks
from feedpoint.report.lines import Line
from feedpoint.report.rounding import frequency_decimals, megahertz, plain_megahertz, shown, with_prefix
from feedpoint.result import FeedpointResult
from feedpoint.run.record import Run
from feedpoint.sweep.record import Sweep

_LABEL, _COLUMN = 18, 31
_MOST_RESONANCES = 8
_SHOWN = (
    ("length_m", "", "m"),
    ("z0_ohm", "", "ohm"),
    ("velocity_factor", "v ", ""),
    ("delay_ns", "", "ns"),
    ("impedance_ratio", "impedance ratio ", ""),
    ("two_port", "", ""),
    ("series_resistance_ohm", "series ", "ohm"),
    ("series_inductance_h", "series ", "H"),
    ("series_capacitance_f", "series ", "F"),
    ("shunt_resistance_ohm", "shunt ", "ohm"),
    ("shunt_inductance_h", "shunt ", "H"),
    ("shunt_capacitance_f", "shunt ", "F"),
)
_PREFIXED = ("H", "F")
_ORIGINS = {
    "catalogue": "catalogue",
    "sheet": "run sheet",
    "log": "field log",
    "option": "option",
    "default": "assumed",
    "call": "given",
}


def summary_of_ends(result: FeedpointResult) -> list[Line]:
    """Return the summary of `deembed` and `embed`: readings at the antenna terminals beside those at the shack end."""
    verb = "de-embedded through" if result.direction == "deembed" else "embedded through"
    lines = [Line(one_line(f"{result.sweep.source}, {verb} {result.run.name}:"), "bold")]
    lines += [Line(f"  {text}") for text in (*_sections(result.run), *_reference(result.sweep))]
    lines += [Line(""), _row("", "at the antenna terminals", "at the shack end", "bold")]
    lines += _readings(result, [result.landmarks, result.shack_landmarks])
    lines += [Line(_loss(result)), Line(_interval_note(result.run)), Line("")]
    return lines


def summary_of_sweep(result: FeedpointResult) -> list[Line]:
    """Return the summary of `inspect`: what the file was understood to be, and readings at the shack end."""
    sweep = result.sweep
    lines = [Line(one_line(f"{sweep.source}:"), "bold")]
    facts = {key.replace("_", " "): str(value) for key, value in sweep.understood_as.items()}
    facts["reference"] = f"{sweep.reference_ohm:g} ohm"
    ends = (plain_megahertz(result.frequency_hz[0]), plain_megahertz(result.frequency_hz[-1]))
    facts["points"] = f"{result.frequency_hz.size}, {ends[0]} to {ends[1]} MHz"
    lines += [Line(f"{key:<{_LABEL}}{one_line(value)}") for key, value in facts.items()]
    lines += [Line(f"{'comment':<{_LABEL}}{_cut(one_line(comment))}") for comment in sweep.comments[:10]]
    if len(sweep.comments) > 10:
        lines.append(Line(f"{'':<{_LABEL}}({len(sweep.comments) - 10} more comment lines)"))
    lines += [Line(""), _row("", "at the shack end", style="bold")]
    return [*lines, *_readings(result, [result.shack_landmarks]), Line("")]


def _cut(text: str) -> str:
    """A text as far as it fits beside its label into 80 columns."""
    room = 80 - _LABEL
    return text if len(text) <= room else text[: room - 3] + "..."


def _row(label: str, first: str, second: str = "", style: str = "") -> Line:
    return Line(f"{label:<{_LABEL}}{first + '  ':<{_COLUMN}}{second}".rstrip(), style)


def _sections(run: Run) -> Iterator[str]:
    for section in run.sections:
        figures = section.figures()
        parts = [name + _figure(figures[key].value, unit) for key, name, unit in _SHOWN if key in figures]
        origins = dict.fromkeys(_ORIGINS[figure.origin] for figure in figures.values())
        cable = f" ({figures['cable'].value})" if "cable" in figures and figures["cable"].value != section.name else ""
        yield one_line(f"{section.name}{cable}: {', '.join(parts)} [{', '.join(origins)}]")
    temperature = run.temperature_c
    yield f"cable temperature {temperature.value:g} C [{_ORIGINS[temperature.origin]}]"


def _reference(sweep: Sweep) -> Iterator[str]:
    """What readings refer to, which no file states."""
    origin = sweep.understood_as.get("reference_origin")
    if origin is not None:
        yield f"reference of the readings {sweep.reference_ohm:g} ohm [{_ORIGINS[str(origin)]}]"


def _figure(value: float | str, unit: str) -> str:
    if isinstance(value, str):
        return value
    return with_prefix(value, unit) if unit in _PREFIXED else f"{value:.4g} {unit}".rstrip()


def _readings(result: FeedpointResult, ends: Sequence[Landmarks]) -> Iterator[Line]:
    decimals = frequency_decimals(result.frequency_hz.tolist())
    columns = [_resonances(end, decimals) for end in ends]
    for number, cells in enumerate(zip_longest(*columns, fillvalue="")):
        yield _row("resonance" if number == 0 else "", *cells)
    yield _row("minimum SWR", *(_minimum(end, decimals) for end in ends))
    yield _row("SWR <= 2", *(_swr_2(end, decimals) for end in ends))
    for readings in zip(*(end.bands for end in ends), strict=True):
        name = one_line(readings[0].band.name)
        label = f"worst SWR {name}"
        # A long name needs the room for itself.
        yield _row(label if len(label) < _LABEL else name[: _LABEL - 1], *_bands(readings))


def _resonances(end: Landmarks, decimals: int) -> list[str]:
    cells = [
        f"{megahertz(resonance.frequency_hz.value or 0.0, decimals)} MHz, R {shown(resonance.resistance_ohm.value)} "
        f"{resonance.kind}"
        for resonance in end.resonances[:_MOST_RESONANCES]
    ]
    if len(end.resonances) > _MOST_RESONANCES:
        cells.append(f"and {len(end.resonances) - _MOST_RESONANCES} more")
    return cells or ["none within the sweep"]


def _minimum(end: Landmarks, decimals: int) -> str:
    return f"{shown(end.minimum_swr.value)} at {megahertz(end.minimum_swr_hz.value or 0.0, decimals)} MHz"


def _swr_2(end: Landmarks, decimals: int) -> str:
    low, high = end.swr2_low_hz.value, end.swr2_high_hz.value
    if end.minimum_swr.value is None or end.minimum_swr.value > 2.0:
        return "nowhere"
    low_text = megahertz(low, decimals) if low is not None else "below the sweep"
    high_text = f"{megahertz(high, decimals)} MHz" if high is not None else "above the sweep"
    return f"{low_text} to {high_text}" if low is not None or high is not None else "the whole sweep"


def _bands(readings: Sequence[BandReading]) -> list[str]:
    cells = [
        shown(reading.worst_swr.value) if reading.worst_swr.value is not None else "not covered by the sweep"
        for reading in readings
    ]
    limit = readings[0].band.swr_limit
    return [f"{cells[0]} (limit {limit:g})" if limit is not None else cells[0], *cells[1:]]


def _loss(result: FeedpointResult) -> str:
    frequencies, losses = result.columns["frequency_hz"], result.columns["matched_loss_db"]
    low = f"{shown(losses[0])} dB at {plain_megahertz(frequencies[0])} MHz"
    if len(losses) == 1:
        return f"{'matched loss':<{_LABEL}}{low}"
    return f"{'matched loss':<{_LABEL}}{low}, {shown(losses[-1])} dB at {plain_megahertz(frequencies[-1])} MHz"


def _interval_note(run: Run) -> str:
    if run.states_tolerances:
        return "no interval: tolerances are stated, but this version does not propagate them"
    return "no interval: no tolerances stated"
