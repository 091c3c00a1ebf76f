"""
Every refusal of the package, in one tree.

    FeedpointError              anything that the package refuses
      InputRefused              what was read is not what it must be (exit code 3 of the command)
        SweepRefused            a sweep file, or arrays that make no sweep
        RunRefused              a run sheet, catalogue, two-port file, or figures that make no run
      OutputRefused             a result that cannot be written where or how it was asked for (exit code 3)
      WrongUsage                a request that contradicts itself or its sweep (exit code 2 of the command)

A message reads *where: what was found, what was expected. What to do.* The place is kept as attributes too, so that
a caller can point at it: `source` is a file name or another name of the input, `line` counts from 1, `key` names an
entry such as ``section 2, length_m``.
"""


class FeedpointError(Exception):
    """Anything that feedpoint refuses; `str()` is the whole one-line message."""

    def __init__(self, message: str, *, source: str = "", line: int | None = None, key: str = "") -> None:
        self.message = message
        self.source = source
        self.line = line
        self.key = key
        super().__init__(str(self))

    def __str__(self) -> str:
        places = [self.source] if self.source else []
        if self.line is not None:
            places.append(f"line {self.line}")
        if self.key:
            places.append(self.key)
        where = ", ".join(places)
        return one_line(f"{where}: {self.message}" if where else self.message)


class InputRefused(FeedpointError):
    """What was read is not what it must be."""


class SweepRefused(InputRefused):
    """A sweep file, or arrays that make no sweep."""


class RunRefused(InputRefused):
    """A run sheet, catalogue, two-port file, or figures that make no run."""


class OutputRefused(FeedpointError):
    """A result that cannot be written where or how it was asked for."""


class WrongUsage(FeedpointError):
    """A request that contradicts itself or its sweep."""


def one_line(text: str) -> str:
    """Return `text` with every control character shown as an escape, so that a hostile file name stays on its line."""
    return "".join(character if character.isprintable() else repr(character)[1:-1] for character in text)


def quoted(text: str, limit: int = 60) -> str:
    """Return `text` in quotes for a message, cut to `limit` characters."""
    shown = text if len(text) <= limit else text[: limit - 3] + "..."
    return "'" + one_line(shown) + "'"
