"""The rooms of the house: each imports only rooms above it; rooms on one line do not import one another."""

import ast
from pathlib import Path

import pytest

PACKAGE = Path(__file__).parents[2] / "feedpoint"
# From the foundations up. `sweep` and `run` stand on one line but for the reading of files, which `run` takes from
# `sweep`; that is why `sweep` comes first.
ROOMS = [
    {"errors"},
    {"units", "finding", "interval", "assumed"},
    {"line"},
    {"sweep"},
    {"run"},
    {"planes", "landmarks"},
    {"audit"},
    {"result"},
    {"selection"},
    {"report"},
    {"cli"},
    {"__init__", "__main__"},
]
LEVEL = {room: level for level, rooms in enumerate(ROOMS) for room in rooms}


def room_of(path: Path) -> str:
    first = path.relative_to(PACKAGE).parts[0]
    return first.removesuffix(".py")


def imported_rooms(path: Path) -> set[str]:
    """Rooms that a file imports, wherever in it the import stands."""
    rooms = set()
    for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))):
        names = []
        if isinstance(node, ast.ImportFrom) and node.module:
            names = [node.module] if node.module != "feedpoint" else [f"feedpoint.{alias.name}" for alias in node.names]
        elif isinstance(node, ast.Import):
            names = [alias.name for alias in node.names]
        rooms |= {name.split(".")[1] for name in names if name.startswith("feedpoint.")}
    return rooms


FILES = sorted(PACKAGE.rglob("*.py"))


@pytest.mark.parametrize("path", FILES, ids=lambda path: str(path.relative_to(PACKAGE)))
def test_file_imports_only_rooms_above_its_own(path):
    room = room_of(path)
    assert room in LEVEL, f"{room} has no place in the house yet"
    too_high = {other for other in imported_rooms(path) - {room} if LEVEL[other] >= LEVEL[room]}
    assert not too_high


def imported_modules(path: Path) -> set[str]:
    modules = set()
    for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))):
        if isinstance(node, ast.ImportFrom) and node.module:
            modules.add(node.module.split(".")[0])
        elif isinstance(node, ast.Import):
            modules |= {alias.name.split(".")[0] for alias in node.names}
    return modules


@pytest.mark.parametrize("path", FILES, ids=lambda path: str(path.relative_to(PACKAGE)))
def test_screens_and_command_line_stay_out_of_the_computation(path):
    room = room_of(path)
    modules = imported_modules(path)
    if room not in ("report", "cli", "__main__"):
        assert not modules & {"typer", "rich", "matplotlib", "click"}
    if room == "cli":
        assert "numpy" not in modules
    assert "click" not in modules


def test_exported_names_are_those_that_exist():
    import feedpoint

    assert sorted(feedpoint.__all__) == sorted(feedpoint._HOME)
    for name in feedpoint.__all__:
        assert getattr(feedpoint, name) is not None
    with pytest.raises(AttributeError, match="no_such_name"):
        _ = feedpoint.no_such_name
