"""
feedpoint: the impedance at the antenna terminals, from a sweep taken at the equipment end of the coax run.

    import feedpoint
    sweep = feedpoint.read_sweep("antenna.s1p")
    run = feedpoint.read_run_sheet("run.toml")
    result = feedpoint.deembed(sweep, run)
    result.table()

Every refusal is a `FeedpointError`. Names are imported when they are first used, so that `import feedpoint` is quick.
"""

from importlib import import_module
from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from feedpoint.assumed import Assumed
    from feedpoint.errors import (
        FeedpointError,
        InputRefused,
        OutputRefused,
        RunRefused,
        SweepRefused,
        WrongUsage,
    )
    from feedpoint.finding import Finding
    from feedpoint.interval import Interval
    from feedpoint.line.loss_law import LossLaw
    from feedpoint.result import FeedpointResult, deembed, embed
    from feedpoint.run.cable import CableSection
    from feedpoint.run.record import AnalyzerErrors, Band, Run
    from feedpoint.run.sections import LumpedSection, TransformerSection
    from feedpoint.run.sheet import parse_run_sheet, read_run_sheet
    from feedpoint.run.two_port_file import TwoPortSection
    from feedpoint.sweep.reader import read_sweep
    from feedpoint.sweep.record import Sweep

_HOME = {
    "AnalyzerErrors": "run.record",
    "Assumed": "assumed",
    "Band": "run.record",
    "CableSection": "run.cable",
    "FeedpointError": "errors",
    "FeedpointResult": "result",
    "Finding": "finding",
    "InputRefused": "errors",
    "Interval": "interval",
    "LossLaw": "line.loss_law",
    "LumpedSection": "run.sections",
    "OutputRefused": "errors",
    "Run": "run.record",
    "RunRefused": "errors",
    "Sweep": "sweep.record",
    "SweepRefused": "errors",
    "TransformerSection": "run.sections",
    "TwoPortSection": "run.two_port_file",
    "WrongUsage": "errors",
    "deembed": "result",
    "embed": "result",
    "parse_run_sheet": "run.sheet",
    "read_run_sheet": "run.sheet",
    "read_sweep": "sweep.reader",
}

__all__ = [
    "AnalyzerErrors",
    "Assumed",
    "Band",
    "CableSection",
    "FeedpointError",
    "FeedpointResult",
    "Finding",
    "InputRefused",
    "Interval",
    "LossLaw",
    "LumpedSection",
    "OutputRefused",
    "Run",
    "RunRefused",
    "Sweep",
    "SweepRefused",
    "TransformerSection",
    "TwoPortSection",
    "WrongUsage",
    "deembed",
    "embed",
    "parse_run_sheet",
    "read_run_sheet",
    "read_sweep",
]


def __getattr__(name: str) -> Any:
    if name not in _HOME:
        raise AttributeError(f"module 'feedpoint' has no attribute {name!r}")
    value = getattr(import_module(f"feedpoint.{_HOME[name]}"), name)
    globals()[name] = value
    return value
