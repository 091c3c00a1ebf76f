"""Results as the text of files, and files written whole or not at all."""

import csv
import io
import json
import os
import stat
import tempfile
from collections.abc import Sequence
from math import isnan
from pathlib import Path
from typing import Any

import numpy as np

from feedpoint.errors import OutputRefused, one_line
from feedpoint.line import ComplexArray, RealArray
from feedpoint.result import COLUMNS, INSPECT_COLUMNS, FeedpointResult
from feedpoint.selection import Rows


def csv_text(results: Sequence[FeedpointResult], rows: Sequence[Rows], *, inspecting: bool = False) -> str:
    """
    Return the rows of one or several results as CSV, full precision.

    Infinite values are `inf`, unknown ones empty. Several results have a first column `sweep`.
    """
    names = INSPECT_COLUMNS if inspecting else COLUMNS
    several = len(results) > 1
    text = io.StringIO()
    writer = csv.writer(text, lineterminator="\n")
    writer.writerow((["sweep"] if several else []) + list(names))
    for result, chosen in zip(results, rows, strict=True):
        cells = zip(*(_cells(chosen.columns[name].tolist()) for name in names), strict=True)
        first = [result.sweep.source] if several else []
        writer.writerows([*first, *row] for row in cells)
    return text.getvalue()


def _cells(values: list[float]) -> list[str]:
    return ["" if isnan(value) else repr(value) for value in values]


def json_text(envelopes: Sequence[Any]) -> str:
    """Return one envelope, or the list of several, as JSON."""
    content = envelopes[0] if len(envelopes) == 1 else list(envelopes)
    return json.dumps(content, indent=1, allow_nan=False) + "\n"


def one_port_text(result: FeedpointResult, rows: Rows, *, inspecting: bool = False) -> str:
    """Return the Touchstone file of a result: the end of the run that was computed, with how in a comment."""
    source, run = result.sweep.source, result.run.name
    comment = {
        "deembed": f"At the antenna terminals: {source} de-embedded through {run}.",
        "embed": f"At the shack end: {source} embedded through {run}.",
    }[result.direction]
    comment = f"At the shack end: {source}." if inspecting else comment
    frequencies = rows.columns["frequency_hz"]
    return touchstone_text(frequencies, rows.saved_gamma, result.sweep.reference_ohm, comment)


def touchstone_text(frequency_hz: RealArray, gamma: ComplexArray, reference_ohm: float, comment: str) -> str:
    """
    Return a one-port as Touchstone 1.1, real and imaginary part, in Hz, full precision.

    Raises
    ------
    OutputRefused
        For a reflection that is not finite.
    """
    import skrf  # 0.4 s to import

    if not np.all(np.isfinite(gamma)):
        raise OutputRefused("a reflection is infinite there, which a Touchstone file cannot hold.")
    network = skrf.Network(
        frequency=skrf.Frequency.from_f(frequency_hz, unit="hz"),
        s=gamma[:, None, None],
        z0=reference_ohm,
        comments=one_line(comment),
    )
    digits = "{:.17g}"
    text: str = network.write_touchstone(
        "one_port",
        return_string=True,
        form="ri",
        format_spec_A=digits,
        format_spec_B=digits,
        format_spec_freq=digits,
        skrf_comment=False,
    )
    return text


def write_whole(path: Path, text: str) -> None:
    """
    Write a file whole or not at all: to a temporary file beside it, which then takes its name.

    A link is followed, and an existing file keeps its permissions; what is no file (a pipe, a device) is written to.

    Raises
    ------
    OutputRefused
        If the folder is missing or cannot be written to.
    """
    content = text.encode("utf-8", errors="backslashreplace")
    try:
        target = Path(os.path.realpath(path))
        if target.exists() and not target.is_file():
            target.write_bytes(content)
        else:
            _replace(target, content)
    except OSError as problem:
        raise OutputRefused(f"cannot be written: {problem.strerror}.", source=str(path)) from None


def _replace(target: Path, content: bytes) -> None:
    mode = target.stat().st_mode if target.exists() else 0o666 & ~_umask()
    handle, temporary = tempfile.mkstemp(prefix=".feedpoint-", dir=target.parent)
    try:
        with os.fdopen(handle, "wb") as file:
            file.write(content)
        os.chmod(temporary, stat.S_IMODE(mode))
        os.replace(temporary, target)
    except BaseException:
        os.unlink(temporary)
        raise


def _umask() -> int:
    """The process's file mask, which can only be read by setting it."""
    mask = os.umask(0o022)
    os.umask(mask)
    return mask
