"""The documents say what the code does: real output, every command, option, key, column and finding."""

import ast
import re
from pathlib import Path

import pytest
from typer.main import get_command

from feedpoint.cli.app import app
from feedpoint.result import COLUMNS, INSPECT_COLUMNS
from feedpoint.run import forms
from tests.structure.console import examples, output_of

REPOSITORY = Path(__file__).parents[2]
DOCS = REPOSITORY / "docs"


def document(name):
    return (DOCS / name).read_text(encoding="utf-8")


@pytest.mark.parametrize("example", examples(), ids=lambda example: f"{example.document}: {example.command}")
def test_example_shows_the_real_output(example):
    assert output_of(example.command) == example.output


def test_there_are_examples():
    assert len(examples()) >= 5


def test_python_example_of_the_readme_runs(monkeypatch):
    text = (REPOSITORY / "README.md").read_text(encoding="utf-8")
    (code,) = re.findall(r"```python\n(.*?)```", text, re.DOTALL)
    monkeypatch.chdir(REPOSITORY)
    names = {}
    exec(compile(code, "README.md", "exec"), names)
    assert len(names["result"].table()) == 401


def test_every_command_and_option_is_in_the_reference():
    reference = document("commands.md")
    for name, command in get_command(app).commands.items():
        assert f"`feedpoint {name}" in reference
        for parameter in command.params:
            for option in (name for name in parameter.opts if name.startswith("--")):
                assert f"`{option}`" in reference, option


def test_every_column_is_in_the_reference():
    reference = document("commands.md")
    for column in (*COLUMNS, *INSPECT_COLUMNS):
        assert f"`{column}`" in reference


def test_every_key_of_a_sheet_is_explained():
    text = document("run-sheet.md")
    for form in vars(forms).values():
        if isinstance(form, type) and issubclass(form, forms.Form):
            for key in form.model_fields:
                assert re.search(rf"\b{key}\b", text), key


def test_the_sheet_of_the_documentation_is_a_sheet(tmp_path):
    from feedpoint.run.sheet import parse_run_sheet

    two_port = "# MHz S RI R 50\n1 0 0 1 0 1 0 0 0\n500 0 0 1 0 1 0 0 0\n"
    (tmp_path / "arrestor.s2p").write_text(two_port, encoding="ascii")
    (tmp_path / "our_cables.toml").write_text(re.findall(r"```toml\n(.*?)```", document("run-sheet.md"), re.DOTALL)[1])
    sheet = re.findall(r"```toml\n(.*?)```", document("run-sheet.md"), re.DOTALL)[0]
    sheet = sheet.replace("[run]\n", '[run]\ncables_file = "our_cables.toml"\n').replace("RG-58C/U", "left-over reel")
    assert len(parse_run_sheet(sheet, folder=tmp_path).sections) == 3


def codes_of_findings():
    """First argument of every `Finding(...)` in the package."""
    for path in (REPOSITORY / "feedpoint").rglob("*.py"):
        for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))):
            if isinstance(node, ast.Call) and getattr(node.func, "id", "") == "Finding":
                yield ast.literal_eval(node.args[0])


def test_every_finding_is_explained():
    explained = document("method.md")
    codes = set(codes_of_findings())
    assert len(codes) >= 8
    for code in codes:
        assert f"`{code}`" in explained, code


def test_links_lead_somewhere():
    for path in (REPOSITORY / "README.md", REPOSITORY / "DEVELOPERS.md", *DOCS.glob("*.md")):
        for target in re.findall(r"\]\(([^)#]+)", path.read_text(encoding="utf-8")):
            if "://" not in target:
                assert (path.parent / target).exists(), f"{path.name}: {target}"
