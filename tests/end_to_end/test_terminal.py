"""What a terminal shows: colour only there, folded findings, a progress bar only when it takes long."""

import os
import sys

import pytest

from tests.end_to_end.command import REPOSITORY

pty = pytest.importorskip("pty", reason="needs a system with pseudo-terminals")


def on_a_terminal(*args, cwd, code="from feedpoint.cli.entry import main; main()", **environment):
    """What the command writes to a terminal of 80 columns; `code` starts it."""
    pid, terminal = pty.fork()
    if pid == 0:
        os.chdir(cwd)
        kept = {"PATH": os.environ["PATH"], "PYTHONPATH": str(REPOSITORY), "TERM": "xterm-256color", "COLUMNS": "80"}
        os.execve(sys.executable, [sys.executable, "-c", code, *map(str, args)], kept | environment)
    written = b""
    while True:
        try:
            part = os.read(terminal, 65536)
        except OSError:
            break
        if not part:
            break
        written += part
    os.close(terminal)
    _, status = os.waitpid(pid, 0)
    assert os.waitstatus_to_exitcode(status) == 0, written
    return written.decode("utf-8")


@pytest.fixture
def place(tmp_path):
    (tmp_path / "a.s1p").write_text("# MHz S RI R 75\n1.0 0.5 0.1\n1.1 0.4 0.2\n", encoding="ascii")
    (tmp_path / "run.toml").write_text('[[section]]\ncable = "RG-213/U"\nlength_m = 9\n', encoding="ascii")
    return tmp_path


def test_colour_and_folded_findings_on_a_terminal(place):
    text = on_a_terminal("deembed", "a.s1p", "--run", "run.toml", cwd=place)
    assert "\x1b[1m" in text
    assert "\x1b[33mwarning outside-loss-data" in text
    plain = [line for line in text.replace("\r", "").split("\n") if "\x1b" not in line]
    assert max(map(len, plain)) <= 80


def test_no_color_is_honoured(place):
    assert "\x1b" not in on_a_terminal("deembed", "a.s1p", "--run", "run.toml", cwd=place, NO_COLOR="1")


def test_progress_bar_of_several_sweeps_that_take_long(place):
    long = "from feedpoint.cli import carry; carry.PROGRESS_AFTER_S = {}; from feedpoint.cli.entry import main; main()"
    three = ("deembed", "a.s1p", "a.s1p", "a.s1p", "--run", "run.toml")
    slow = on_a_terminal(*three, cwd=place, code=long.format(-1.0))
    assert "sweeps" in slow
    assert "%" in slow
    assert "%" not in on_a_terminal(*three, "--quiet", cwd=place, code=long.format(-1.0))
    assert "%" not in on_a_terminal(*three, cwd=place, code=long.format(60.0))
    assert "%" not in on_a_terminal(three[0], three[1], *three[-2:], cwd=place, code=long.format(-1.0))
