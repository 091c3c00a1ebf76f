"""Lines of text for the screen, with a style that is used on a terminal only."""

import os
import shutil
import sys
import textwrap
from collections.abc import Iterable
from typing import NamedTuple, TextIO


class Line(NamedTuple):
    """One line, and the style that a terminal shows it in."""

    text: str
    style: str = ""


def show(lines: Iterable[Line], file: TextIO | None = None) -> None:
    """Write lines; styles only on a terminal that wants them (NO_COLOR, https://no-color.org)."""
    file = file or sys.stdout
    if not file.isatty() or os.environ.get("NO_COLOR"):
        file.writelines(f"{line.text}\n" for line in lines)
        return
    # 40 ms to import, and no file or pipe needs them.
    from rich.console import Console
    from rich.text import Text

    console = Console(file=file, highlight=False, markup=False, emoji=False)
    for line in lines:
        console.print(Text(line.text, style=line.style), soft_wrap=True)


def wrapped(text: str, style: str, indent: str, file: TextIO) -> list[Line]:
    """Return a sentence folded to the width of a terminal; as one line anywhere else, so that it can be searched."""
    if not file.isatty():
        return [Line(text, style)]
    width = shutil.get_terminal_size().columns
    folded = textwrap.wrap(text, max(width, 40), subsequent_indent=indent, break_on_hyphens=False)
    return [Line(line, style) for line in folded]
