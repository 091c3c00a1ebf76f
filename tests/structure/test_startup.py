"""The command starts quickly: a heavy module that creeps into start-up is named."""

import subprocess
import sys

import pytest

HEAVY = {"numpy", "scipy", "pandas", "skrf", "matplotlib", "pydantic", "rich"}


def modules_after(code: str, *args: str) -> set[str]:
    """Top-level modules that are loaded when `code` has run with `args` on its command line."""
    report = "\nimport sys\nprint('LOADED', *sorted({name.split('.')[0] for name in sys.modules}))"
    process = subprocess.run(
        [sys.executable, "-c", code + report, *args], capture_output=True, text=True, check=True, timeout=60
    )
    return set(process.stdout.rsplit("LOADED", 1)[1].split())


RUN_COMMAND = """
import sys
from feedpoint.cli.app import app
try:
    app()
except SystemExit:
    pass
"""


def test_import_of_the_package_loads_nothing_heavy():
    assert modules_after("import feedpoint") & HEAVY == set()


def test_help_loads_nothing_heavy():
    # typer reads its own options with pydantic.
    assert modules_after(RUN_COMMAND, "deembed", "--help") & HEAVY <= {"pydantic"}


@pytest.fixture
def files(tmp_path):
    sweep = tmp_path / "a.s1p"
    sweep.write_text("# MHz S RI R 50\n14.0 0.1 0.2\n14.1 0.1 0.1\n14.2 0.1 0.0\n", encoding="ascii")
    sheet = tmp_path / "run.toml"
    sheet.write_text('[[section]]\ncable = "RG-213/U"\nlength_m = 10\n', encoding="ascii")
    return str(sweep), str(sheet)


def test_the_main_job_loads_no_more_than_it_needs(files):
    loaded = modules_after(RUN_COMMAND, "deembed", files[0], "--run", files[1])
    assert loaded & HEAVY <= {"numpy", "pydantic"}


def test_csv_and_json_need_no_more_either(files):
    for form in ("csv", "json"):
        loaded = modules_after(RUN_COMMAND, "deembed", files[0], "--run", files[1], "--format", form)
        assert loaded & HEAVY <= {"numpy", "pydantic"}
