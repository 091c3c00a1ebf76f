"""What a terminal shows: colour only there, folded findings, a progress bar only when it takes long."""

import os
import sys

import numpy as np
import pytest

from tests.end_to_end.command import REPOSITORY

pty = pytest.importorskip("pty", reason="needs a system with pseudo-terminals")


def on_a_terminal(*args, cwd, **environment):
    """What the command writes to a terminal of 80 columns."""
    pid, terminal = pty.fork()
    if pid == 0:
        os.chdir(cwd)
        kept = {"PATH": os.environ["PATH"], "PYTHONPATH": str(REPOSITORY), "TERM": "xterm-256color", "COLUMNS": "80"}
        os.execve(sys.executable, [sys.executable, "-m", "feedpoint", *map(str, args)], kept | environment)
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


def test_progress_bar_only_when_it_takes_longer_than_a_second(place):
    frequency = np.linspace(1e6, 2e6, 60_000)
    rows = "".join(f"{f:.2f} 0.5 0.1\n" for f in frequency)
    names = [f"s{number}.s1p" for number in range(12)]
    for name in names:
        (place / name).write_text("# Hz S RI R 50\n" + rows, encoding="ascii")
    # About 0.2 s for each sweep: two are done before a second has passed, twelve are not.
    many = on_a_terminal("deembed", *names, "--run", "run.toml", "--at", "1MHz", cwd=place)
    assert "sweeps" in many
    assert "%" in many
    quiet = on_a_terminal("deembed", *names, "--run", "run.toml", "--at", "1MHz", "--quiet", cwd=place)
    assert "%" not in quiet
    assert "%" not in on_a_terminal("deembed", "a.s1p", "a.s1p", "--run", "run.toml", cwd=place)
