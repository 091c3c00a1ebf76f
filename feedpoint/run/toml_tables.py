"""TOML files as checked tables: every refusal names the file and its line or key, and a misspelt key its neighbour."""

import re
import tomllib
from collections.abc import Iterable, Mapping
from difflib import get_close_matches
from typing import Any, TypeVar

from pydantic import ValidationError

from feedpoint.errors import RunRefused, quoted
from feedpoint.run.forms import ENTRIES, Form

AnyForm = TypeVar("AnyForm", bound=Form)
Table = Mapping[str, Any]


def parse_toml(text: str, source: str) -> Table:
    """Return the tables of a TOML text; `RunRefused` with the line where it is none."""
    try:
        return tomllib.loads(text)
    except tomllib.TOMLDecodeError as problem:
        message = str(problem)
        place = re.search(r"\(at line (\d+), column (\d+)\)", message)
        line = int(place[1]) if place else text.count("\n") + 1
        what = message[: place.start()].strip() if place else message
        raise RunRefused(f"not valid TOML: {what}.", source=source, line=line) from None
    except (ValueError, RecursionError):
        # tomllib lets Python's own limits through: whole numbers of thousands of digits, nesting without end.
        raise RunRefused("not a sheet: a number or a nesting beyond all sense.", source=source) from None


def checked(form: type[AnyForm], table: object, source: str, place: str, known: Iterable[str] = ()) -> AnyForm:
    """
    Return a table in its form.

    Parameters
    ----------
    place : str
        What the table is called in messages: ``section 2``, ``[run]``.
    known : names
        Keys to look for a near miss among, beside those of `form`.

    Raises
    ------
    RunRefused
        Unknown keys first, since they explain missing ones; then the first value that cannot be.
    """
    if not isinstance(table, Mapping):
        raise RunRefused(f"found {quoted(repr(table))}, expected a table.", source=source, key=place)
    refuse_unknown_keys(table, {*form.model_fields, *known}, source, place)
    try:
        return form.model_validate(dict(table))
    except ValidationError as problem:
        raise _refusal(problem, source, place) from None


def refuse_unknown_keys(table: Table, known: Iterable[str], source: str, place: str) -> None:
    """Raise `RunRefused` for the first key that is not known, with the nearest that is."""
    known = sorted(known)
    for key in table:
        if key not in known:
            near = get_close_matches(key, known, n=1)
            hint = f" Did you mean {quoted(near[0])}?" if near else f" Known here: {', '.join(known)}."
            raise RunRefused(f"unknown key {quoted(key)}.{hint}", source=source, key=place)


# Where pydantic's own words are about Python.
_EXPECTED = {
    "model_type": "expected a table in braces",
    "model_attributes_type": "expected a table in braces",
    "dict_type": "expected a table in braces",
    "list_type": "expected a list in brackets",
    "too_short": "expected at least one entry",
    "string_too_short": "expected a text that is not empty",
}


def _refusal(problem: ValidationError, source: str, place: str) -> RunRefused:
    errors = problem.errors(include_url=False)
    first = next((error for error in errors if error["type"] == "extra_forbidden"), errors[0])
    names = [part for part in first["loc"] if not isinstance(part, str) or part.isidentifier()]
    steps = [f"entry {part + 1}" if isinstance(part, int) else str(part) for part in names]
    key = ", ".join([place, *steps]) if place else ", ".join(steps)
    if first["type"] == "missing":
        return RunRefused("is missing; expected it here.", source=source, key=key)
    if first["type"] == "extra_forbidden":
        point = ENTRIES[str(names[0])]
        near = get_close_matches(str(names[-1]), point.model_fields, n=1, cutoff=0.4)
        hint = f" Did you mean {quoted(near[0])}?" if near else f" Known here: {', '.join(point.model_fields)}."
        key = ", ".join([place, *steps[:-1]])
        return RunRefused(f"unknown key {quoted(str(names[-1]))}.{hint}", source=source, key=key)
    expected = _EXPECTED.get(first["type"]) or first["msg"].replace("Input should be", "expected")
    found = first["input"] if isinstance(first["input"], str) else repr(first["input"])
    return RunRefused(f"found {quoted(found)}, {expected}.", source=source, key=key)
