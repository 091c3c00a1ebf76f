"""From the bytes of an input file to numbered lines of text."""

import re
from pathlib import Path

from feedpoint.errors import InputRefused, SweepRefused

# A sweep of 1,001 points has about 40 kB; two million points fit into this. More is not a sweep.
LARGEST_FILE_BYTES = 64_000_000
# Not str.splitlines: that also splits at form feeds and other signs, and line numbers would no longer be the editor's.
_LINE_END = re.compile("\r\n|\n|\r")


def read_bytes(path: Path, refusal: type[InputRefused] = SweepRefused) -> bytes:
    """Return the content of a file of at most 64 MB; `refusal` if it is missing, unreadable, or larger."""
    try:
        with path.open("rb") as file:
            content = file.read(LARGEST_FILE_BYTES + 1)
    except FileNotFoundError:
        raise refusal("no such file.", source=str(path)) from None
    except IsADirectoryError:
        raise refusal("this is a folder; expected a file.", source=str(path)) from None
    except (OSError, ValueError) as problem:
        reason = getattr(problem, "strerror", None) or str(problem)
        raise refusal(f"cannot be read: {reason}.", source=str(path)) from None
    if len(content) > LARGEST_FILE_BYTES:
        raise refusal("larger than 64 MB; expected a few kilobytes.", source=str(path))
    return content


def decoded(content: bytes, source: str, refusal: type[InputRefused] = SweepRefused) -> str:
    """Return the text of a file in ASCII, UTF-8 (with or without byte-order mark) or Latin-1."""
    if content.startswith((b"\xff\xfe", b"\xfe\xff")):
        raise refusal("the text is UTF-16; expected plain ASCII or UTF-8. Save it as plain text.", source=source)
    if b"\0" in content:
        raise refusal("binary data; expected plain text.", source=source)
    try:
        return content.decode("utf-8-sig")
    except UnicodeDecodeError:
        return content.decode("latin-1")


def numbered_lines(text: str) -> list[tuple[int, str]]:
    """Return the lines of `text` with their numbers, which count from 1."""
    return list(enumerate(_LINE_END.split(text), start=1))
