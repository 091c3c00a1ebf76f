"""
The examples of the documents: console blocks, each a command line and the output that it really has.

    python -m tests.structure.console        writes the output of every example anew
"""

import re
import shlex
from pathlib import Path
from typing import NamedTuple

from tests.end_to_end.command import run_feedpoint

REPOSITORY = Path(__file__).parents[2]
DOCUMENTS = [REPOSITORY / "README.md", *sorted((REPOSITORY / "docs").glob("*.md"))]
_BLOCK = re.compile(r"^```console\n\$ (?P<command>.*)\n(?P<output>(?:(?!```).*\n)*)```$", re.MULTILINE)


class Example(NamedTuple):
    """One console block: where it stands, its command line, its output."""

    document: str
    command: str
    output: str


def examples() -> list[Example]:
    """Every console block of the documents."""
    found = []
    for path in DOCUMENTS:
        text = path.read_text(encoding="utf-8")
        found += [Example(path.name, match["command"], match["output"]) for match in _BLOCK.finditer(text)]
    return found


def output_of(command: str) -> str:
    """What a command line prints: stdout, then stderr, as a terminal shows them when it ends."""
    program, *arguments = shlex.split(command)
    assert program == "feedpoint"
    process = run_feedpoint(*arguments, cwd=REPOSITORY)
    return process.stdout + process.stderr


def write_outputs_anew() -> None:
    for path in DOCUMENTS:
        text = path.read_text(encoding="utf-8")
        anew = _BLOCK.sub(lambda match: f"```console\n$ {match[1]}\n{output_of(match[1])}```", text)
        path.write_text(anew, encoding="utf-8")


if __name__ == "__main__":
    write_outputs_anew()
