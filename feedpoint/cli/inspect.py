"""`feedpoint inspect`: what a sweep file was understood to be, and what the shack end shows."""

from __future__ import annotations

from feedpoint.cli import options as option
from feedpoint.cli.output import OutputOptions, Presentation, RowOptions, deliver
from feedpoint.cli.run_options import bands_of_options


def inspect(
    sweep: option.OneSweep,
    port: option.Port = None,
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
    """
    What a sweep file was understood to be.

    And what it shows at the shack end, before any run is taken off.
    """
    output = OutputOptions(format_, out, strict, quiet)
    output.check([sweep])
    choice = RowOptions(at, from_, to, every, all_rows).choice()
    from feedpoint.report.summary import summary_of_sweep
    from feedpoint.report.tables import shack_end_table
    from feedpoint.result import deembed
    from feedpoint.run.record import Run
    from feedpoint.sweep.reader import read_sweep

    nothing_between = Run((), bands=bands_of_options(band))
    result = deembed(read_sweep(sweep, port=port), nothing_between, swr_reference_ohm=swr_reference)
    deliver([result], choice, output, Presentation(summary_of_sweep, shack_end_table, inspecting=True))
