"""Where a command's results go: table, CSV or JSON on stdout, a file, findings on stderr, the exit code."""

from __future__ import annotations

import os
import sys
from collections.abc import Callable, Iterable, Sequence
from pathlib import Path
from typing import TYPE_CHECKING, NamedTuple

import typer

from feedpoint.cli.options import Format, frequencies_hz
from feedpoint.errors import WrongUsage, one_line, quoted

if TYPE_CHECKING:
    from feedpoint.report.lines import Line
    from feedpoint.result import FeedpointResult
    from feedpoint.selection import RowChoice, Rows

STRICT_FINDING = 4
_STYLES = {"note": "", "warning": "yellow", "error": "bold red"}
_SUFFIXES = {".csv": "csv", ".json": "json", ".s1p": "s1p"}


class RowOptions(NamedTuple):
    """The options that select rows."""

    at: list[str] | None
    from_hz: float | None
    to_hz: float | None
    every: int | None
    all_rows: bool

    def choice(self) -> RowChoice:
        """Return them as the selection that they are; `WrongUsage` where they contradict one another."""
        from feedpoint.selection import RowChoice

        if self.all_rows and self.every is not None:
            raise WrongUsage("--all and --every contradict each other; use one of them.")
        if self.from_hz is not None and self.to_hz is not None and self.from_hz > self.to_hz:
            raise WrongUsage("--from lies above --to; expected the lower frequency first.")
        return RowChoice(frequencies_hz(self.at), self.from_hz, self.to_hz, self.every, self.all_rows)


class OutputOptions(NamedTuple):
    """The options that say where results go."""

    form: Format | None
    out: Path | None
    strict: bool
    quiet: bool

    def check(self, sweeps: Sequence[Path]) -> None:
        """Refuse what contradicts itself or would overwrite a sweep, before any work is done."""
        if self.out is None:
            return
        self.check_inputs(sweeps)
        written = _SUFFIXES.get(self.out.suffix.lower())
        if written is None:
            raise WrongUsage(f"--out {quoted(str(self.out))}: expected a file that ends in .csv, .json or .s1p.")
        if self.form not in (None, Format.TABLE) and self.form != written:
            raise WrongUsage(f"--format {self.form} and --out {quoted(str(self.out))} contradict each other.")
        if written == "s1p" and len(sweeps) > 1:
            raise WrongUsage(f"an .s1p file holds one sweep, not {len(sweeps)}; use .csv or .json.")

    def check_inputs(self, files: Iterable[str | Path]) -> None:
        """Refuse to overwrite what the command has read."""
        for read in files:
            if self.out is not None and os.path.realpath(self.out) == os.path.realpath(read):
                raise WrongUsage(f"--out {quoted(str(self.out))} is read by this command; choose another name.")

    @property
    def file_form(self) -> str | None:
        """Form of the file that is to be written: csv, json or s1p."""
        return _SUFFIXES[self.out.suffix.lower()] if self.out is not None else None


class Presentation(NamedTuple):
    """How a command shows itself: summary and table for people, and whether it is `inspect`, which has no run."""

    summary: Callable[[FeedpointResult], list[Line]]
    table: Callable[[Rows], list[Line]]
    inspecting: bool = False


def deliver(
    results: Sequence[FeedpointResult], choice: RowChoice, options: OutputOptions, presentation: Presentation
) -> None:
    """Write the results where the options want them, then the findings; exits with 4 where --strict asks for it."""
    from feedpoint.selection import chosen_rows

    form = options.file_form or options.form or Format.TABLE
    rows = [chosen_rows(result, choice, thin=form == Format.TABLE) for result in results]
    if options.out is not None:
        options.check_inputs(file for result in results for file in result.run.files)
        _write_file(options.out, form, results, rows, presentation)
    else:
        _write_stdout(form, results, rows, presentation)
    _finish(results, rows, options)


def _write_file(
    out: Path, form: str, results: Sequence[FeedpointResult], rows: Sequence[Rows], presentation: Presentation
) -> None:
    from feedpoint.report.files import write_whole
    from feedpoint.report.lines import Line, show

    write_whole(out, _file_text(form, results, rows, presentation))
    lines = [line for result in results for line in presentation.summary(result)]
    count = sum(len(chosen.saved_gamma) for chosen in rows)
    show([*lines, Line(one_line(f"wrote {count} {'row' if count == 1 else 'rows'} to {out}"))])


def _file_text(
    form: str, results: Sequence[FeedpointResult], rows: Sequence[Rows], presentation: Presentation
) -> str:
    from feedpoint.report.envelope import envelope
    from feedpoint.report.files import csv_text, json_text, one_port_text

    if form == "csv":
        return csv_text(results, rows, inspecting=presentation.inspecting)
    if form == "s1p":
        return one_port_text(results[0], rows[0], inspecting=presentation.inspecting)
    return json_text(
        [
            envelope(result, chosen, inspecting=presentation.inspecting)
            for result, chosen in zip(results, rows, strict=True)
        ]
    )


def _write_stdout(
    form: str, results: Sequence[FeedpointResult], rows: Sequence[Rows], presentation: Presentation
) -> None:
    if form != Format.TABLE:
        sys.stdout.write(_file_text(form, results, rows, presentation))
        return
    from feedpoint.report.lines import Line, show

    for number, (result, chosen) in enumerate(zip(results, rows, strict=True)):
        show([Line("")] if number else [])
        show([*presentation.summary(result), *presentation.table(chosen)])


def _finish(results: Sequence[FeedpointResult], rows: Sequence[Rows], options: OutputOptions) -> None:
    """Show the findings on stderr, and end with the exit code that they ask for."""
    from feedpoint.report.lines import show, wrapped

    sys.stdout.flush()
    serious = False
    lines: list[Line] = []
    for result, chosen in zip(results, rows, strict=True):
        about = f"{result.sweep.source}: " if len(results) > 1 else ""
        for finding in (*result.findings, *chosen.findings):
            serious = serious or finding.severity == "error"
            text = one_line(f"{finding.severity} {finding.code}: {about}{finding.message}")
            lines += wrapped(text, _STYLES[finding.severity], "  ", sys.stderr)
    if not options.quiet:
        show(lines, sys.stderr)
    if options.strict and serious:
        raise typer.Exit(STRICT_FINDING)
