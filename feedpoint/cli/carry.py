"""`feedpoint deembed` and `feedpoint embed`: one sweep through one run, in either direction, with the same options."""

from __future__ import annotations

import sys
import time
from collections.abc import Callable, Iterable, Iterator, Sequence
from functools import partial
from pathlib import Path
from typing import TYPE_CHECKING

from feedpoint.cli import options as option
from feedpoint.cli.output import OutputOptions, Presentation, RowOptions, deliver
from feedpoint.cli.run_options import CableOptions, RunOptions
from feedpoint.errors import WrongUsage

if TYPE_CHECKING:
    from feedpoint.result import FeedpointResult
    from feedpoint.sweep.record import Sweep

PROGRESS_AFTER_S = 1.0


def _command(direction: str, description: str) -> Callable[..., None]:
    """
    Return the command for a direction; both take the same options.

    Long, because typer reads the options off one signature.
    """

    def carry(
        sweeps: option.Sweeps = None,
        reading: option.Readings = None,
        reference: option.Reference = None,
        port: option.Port = None,
        run: option.RunSheet = None,
        cable: option.Cable = None,
        length: option.Length = None,
        z0: option.Z0 = None,
        velocity_factor: option.VelocityFactor = None,
        loss_at: option.LossAt = None,
        length_tolerance: option.LengthTolerance = None,
        loss_tolerance: option.LossTolerance = None,
        velocity_factor_tolerance: option.VelocityFactorTolerance = None,
        cables_file: option.CablesFile = None,
        temperature: option.Temperature = None,
        analyzer: option.Analyzer = None,
        band: option.Bands = None,
        at: option.At = None,
        from_: option.From = None,
        to: option.To = None,
        every: option.Every = None,
        all_rows: option.AllRows = False,
        swr_reference: option.SwrReference = None,
        format_: option.OutputFormat = None,
        out: option.Out = None,
        strict: option.Strict = False,
        quiet: option.Quiet = False,
    ) -> None:
        one_cable = CableOptions(
            cable,
            length,
            z0,
            velocity_factor,
            loss_at,
            length_tolerance,
            loss_tolerance,
            velocity_factor_tolerance,
        )
        run_options = RunOptions(run, one_cable, cables_file, temperature, analyzer, band)
        output = OutputOptions(format_, out, strict, quiet)
        output.check(sweeps or [])
        output.check_inputs(path for path in (run, cables_file, analyzer) if path is not None)
        choice = RowOptions(at, from_, to, every, all_rows).choice()
        results = _results(direction, _sources(sweeps, reading, reference, port), run_options, swr_reference, quiet)
        from feedpoint.report.summary import summary_of_ends
        from feedpoint.report.tables import both_ends_table

        deliver(results, choice, output, Presentation(summary_of_ends, both_ends_table))

    carry.__name__ = direction
    carry.__doc__ = description
    return carry


deembed = _command(
    "deembed",
    """
    Impedance at the antenna terminals.

    From sweeps that were taken at the shack end of the coax run, and a description of the run.
    """,
)
embed = _command(
    "embed",
    """
    What the shack end shows of a known antenna.

    From impedances that are known at the antenna terminals, and a description of the run.
    """,
)

_Read = Callable[[], "Sweep"]


def _sources(
    paths: list[Path] | None, readings: list[str] | None, reference: float | None, port: int | None
) -> list[_Read]:
    """Return what is to be read, each as a call that reads it."""
    from feedpoint.assumed import Assumed
    from feedpoint.sweep.reader import read_sweep
    from feedpoint.sweep.reading import sweep_of_readings

    if paths and readings:
        raise WrongUsage("a sweep file and --reading contradict each other; use one of them.")
    if readings:
        if port is not None:
            raise WrongUsage("--port belongs to a sweep file, not to --reading.")
        stated = Assumed(50.0, "default") if reference is None else Assumed(reference, "option", "--reference")
        return [partial(sweep_of_readings, readings, stated)]
    if reference is not None:
        raise WrongUsage("--reference belongs to --reading; a Touchstone file states its own.")
    if not paths:
        raise WrongUsage("nothing to work on; name a sweep file, or use --reading '17.8-22j@14.2MHz'.")
    return [partial(read_sweep, path, port=port) for path in paths]


def _results(
    direction: str, sources: Sequence[_Read], run_options: RunOptions, swr_reference: float | None, quiet: bool
) -> list[FeedpointResult]:
    import feedpoint.result

    run = run_options.run()
    carried = getattr(feedpoint.result, direction)
    progress = _with_progress(sources, "sweeps", quiet)
    return [carried(read(), run, swr_reference_ohm=swr_reference) for read in progress]


def _with_progress(items: Sequence[_Read], what: str, quiet: bool) -> Iterable[_Read]:
    """Yield the items, with a progress bar on a terminal once they have taken more than a second."""
    if quiet or len(items) < 2 or not sys.stderr.isatty():
        return items
    return _progressing(items, what)


def _progressing(items: Sequence[_Read], what: str) -> Iterator[_Read]:
    from rich.console import Console
    from rich.progress import Progress

    started = time.monotonic()
    progress = Progress(console=Console(stderr=True), transient=True)
    task = progress.add_task(what, total=len(items))
    try:
        for done, item in enumerate(items):
            if time.monotonic() - started > PROGRESS_AFTER_S and not progress.live.is_started:
                progress.start()
            progress.update(task, completed=done)
            yield item
    finally:
        if progress.live.is_started:
            progress.stop()
