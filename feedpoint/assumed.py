"""A value that the result rests on, with where it came from."""

from dataclasses import dataclass
from typing import Generic, Literal, TypeVar

Origin = Literal["catalogue", "sheet", "log", "option", "default", "call"]
Value = TypeVar("Value")


@dataclass(frozen=True)
class Assumed(Generic[Value]):
    """
    A value and its origin: catalogue, (run) sheet, (field) log, option, default, or a call from Python.

    `where` says more closely: the catalogue entry, the file and key, the option.
    """

    value: Value
    origin: Origin = "call"
    where: str = ""
