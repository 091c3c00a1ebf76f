"""Results as nested plain values, for JSON: infinite and unknown numbers are null, never NaN."""

from collections.abc import Iterable, Mapping
from math import isfinite
from typing import Any

from feedpoint.finding import Finding
from feedpoint.interval import Interval
from feedpoint.landmarks import Landmarks
from feedpoint.result import COLUMNS, INSPECT_COLUMNS, FeedpointResult
from feedpoint.run.record import Run
from feedpoint.selection import Rows
from feedpoint.sweep.record import Sweep

Plain = dict[str, Any]


def envelope(result: FeedpointResult, rows: Rows, *, inspecting: bool = False) -> Plain:
    """Return the envelope of `deembed` and `embed`, or of `inspect`, which has no run."""
    names = INSPECT_COLUMNS if inspecting else COLUMNS
    values = [[_number(value) for value in rows.columns[name].tolist()] for name in names]
    return {
        "sweep": _sweep(result.sweep),
        "run": None if inspecting else _run(result.run),
        "summary": _summary(result, inspecting=inspecting),
        "points": [dict(zip(names, row, strict=True)) for row in zip(*values, strict=True)],
        "findings": [_finding(finding) for finding in (*result.findings, *rows.findings)],
    }


def _number(value: float | None) -> float | None:
    return value if value is not None and isfinite(value) else None


def _interval(interval: Interval) -> Plain:
    return {"value": _number(interval.value), "low": _number(interval.low), "high": _number(interval.high)}


def _finding(finding: Finding) -> Plain:
    figures = {key: _number(value) if isinstance(value, float) else value for key, value in finding.figures.items()}
    return {
        "code": finding.code,
        "severity": finding.severity,
        "message": finding.message,
        "figures": figures,
    }


def _sweep(sweep: Sweep) -> Plain:
    return {
        "source": sweep.source,
        "reference_ohm": sweep.reference_ohm,
        "points": sweep.frequency_hz.size,
        "low_hz": float(sweep.frequency_hz[0]),
        "high_hz": float(sweep.frequency_hz[-1]),
        "sha256": sweep.sha256 or None,
        "understood_as": dict(sweep.understood_as),
        "comments": list(sweep.comments),
    }


def _run(run: Run) -> Plain:
    return {
        "name": run.name,
        "source": run.source,
        "temperature_c": _assumed(run.temperature_c.value, run.temperature_c.origin, run.temperature_c.where),
        "sections": [
            {
                "name": section.name,
                "kind": section.kind,
                "figures": {
                    key: _assumed(figure.value, figure.origin, figure.where)
                    for key, figure in section.figures().items()
                },
            }
            for section in run.sections
        ],
    }


def _assumed(value: float | str, origin: str, where: str) -> Plain:
    return {"value": value, "origin": origin, "where": where}


def _summary(result: FeedpointResult, *, inspecting: bool) -> Plain:
    """Readings at the antenna terminals; of `inspect`, which knows no run, at the shack end alone."""
    landmarks, shack = result.landmarks, result.shack_landmarks
    return {
        **_landmarks(landmarks),
        "bands": [
            {
                "name": own.band.name,
                "low_hz": own.band.low_hz,
                "high_hz": own.band.high_hz,
                "swr_limit": own.band.swr_limit,
                "shack_worst_swr": _number(seen.worst_swr.value),
                "feedpoint_worst_swr": _interval(Interval(None) if inspecting else own.worst_swr),
                "verdict": None,
            }
            for own, seen in zip(landmarks.bands, shack.bands, strict=True)
        ],
        "shack": _landmarks(shack),
    }


def _landmarks(landmarks: Landmarks) -> Mapping[str, Any]:
    return {
        "resonances": list(_resonances(landmarks)),
        "minimum_swr": _interval(landmarks.minimum_swr),
        "minimum_swr_hz": _interval(landmarks.minimum_swr_hz),
        "swr2_low_hz": _interval(landmarks.swr2_low_hz),
        "swr2_high_hz": _interval(landmarks.swr2_high_hz),
    }


def _resonances(landmarks: Landmarks) -> Iterable[Plain]:
    for resonance in landmarks.resonances:
        yield {
            "frequency_hz": _interval(resonance.frequency_hz),
            "resistance_ohm": _interval(resonance.resistance_ohm),
            "kind": resonance.kind,
        }
