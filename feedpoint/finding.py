"""What the tool noticed about the data: a code, how serious it is, a sentence, figures."""

from collections.abc import Mapping
from dataclasses import dataclass, field
from types import MappingProxyType
from typing import Literal

Severity = Literal["note", "warning", "error"]
Figure = float | int | str | None


@dataclass(frozen=True)
class Finding:
    """
    One thing that was noticed.

    `message` says what was seen, by how much, and what to do; `figures` holds its numbers under keys that carry their
    unit, for programs.
    """

    code: str
    severity: Severity
    message: str
    figures: Mapping[str, Figure] = field(default_factory=dict)

    def __post_init__(self) -> None:
        object.__setattr__(self, "figures", MappingProxyType(dict(self.figures)))
