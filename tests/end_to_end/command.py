"""The real command as a user starts it: a process of its own, in a directory of its own, with a plain environment."""

import os
import re
import signal
import subprocess
import sys
import time
import traceback
from collections.abc import Iterable
from pathlib import Path
from tempfile import TemporaryFile
from typing import IO

# Imported here, before anything is forked, so that no forked command has to.
import feedpoint.cli.app
import feedpoint.report.envelope
import feedpoint.report.files
import feedpoint.report.lines
import feedpoint.report.summary
import feedpoint.report.tables
import feedpoint.run.sheet
import feedpoint.sweep.reader
import feedpoint.sweep.reading  # noqa: F401
from feedpoint.cli.entry import main

REPOSITORY = Path(__file__).resolve().parents[2]

# Nothing here needs more than a few seconds; two cores shared with other work may.
LONGEST_S = 60.0

# What a fragment may be: text (case does not matter), a number that must stand alone, a pattern, or alternatives.
Fragment = str | int | re.Pattern[str] | tuple["Fragment", ...]

COUNT_WORDS = {0: "no", 1: "one", 2: "two", 3: "three", 4: "four", 5: "five", 6: "six", 7: "seven", 9: "nine"}


def clean_environment() -> dict[str, str]:
    """Environment without anything that forces colour or width; 80 columns, as a plain terminal or a log has them."""
    kept = {name: os.environ[name] for name in ("PATH", "HOME", "TMPDIR", "SYSTEMROOT") if name in os.environ}
    # The tree beside this file is the one under test, wherever the process starts.
    return kept | {"PYTHONPATH": str(REPOSITORY), "COLUMNS": "80", "LC_ALL": "C.UTF-8"}


def run_feedpoint(
    *args: str | Path, cwd: Path | None = None, stdin: str | None = None, env: dict[str, str] | None = None
) -> subprocess.CompletedProcess[str]:
    """
    Run `feedpoint ARGS` in a process of its own; `env` is added to the clean environment.

    The process is forked from this one where the system can do that: what takes most of a command's time, importing
    numpy, is done once for hundreds of tests. `start_feedpoint` starts the command as a user does.
    """
    if not hasattr(os, "fork"):
        return start_feedpoint(*args, cwd=cwd, stdin=stdin, env=env)
    environment = clean_environment() | (env or {})
    with TemporaryFile() as given, TemporaryFile() as out, TemporaryFile() as error:
        given.write((stdin or "").encode())
        given.seek(0)
        child = os.fork()
        if child == 0:
            _become_feedpoint([str(arg) for arg in args], cwd, environment, (given, out, error))
        code = _exit_code(child)
        streams = [_text_of(file) for file in (out, error)]
    return subprocess.CompletedProcess(["feedpoint", *map(str, args)], code, *streams)


def _become_feedpoint(
    args: list[str], cwd: Path | None, environment: dict[str, str], streams: tuple[IO[bytes], IO[bytes], IO[bytes]]
) -> None:
    """Be the command, in a forked child, and end with it."""
    code = 1
    try:
        for number, file in enumerate(streams):
            os.dup2(file.fileno(), number)
        sys.stdin, sys.stdout, sys.stderr = (
            os.fdopen(number, mode, encoding="utf-8", closefd=False) for number, mode in ((0, "r"), (1, "w"), (2, "w"))
        )
        os.environ.clear()
        os.environ.update(environment)
        os.chdir(cwd or ".")
        sys.argv = ["feedpoint", *args]
        main()
        code = 0
    except SystemExit as end:
        code = end.code if isinstance(end.code, int) else 0 if end.code is None else 1
    except BaseException:
        traceback.print_exc()
    finally:
        sys.stdout.flush()
        sys.stderr.flush()
        os._exit(code)


def _exit_code(child: int) -> int:
    """Exit code of a forked child; one that hangs is ended and fails the test."""
    deadline = time.monotonic() + LONGEST_S
    while time.monotonic() < deadline:
        pid, status = os.waitpid(child, os.WNOHANG)
        if pid:
            return os.waitstatus_to_exitcode(status)
        time.sleep(0.002)
    os.kill(child, signal.SIGKILL)
    os.waitpid(child, 0)
    raise AssertionError(f"the command took more than {LONGEST_S} s")


def _text_of(file: IO[bytes]) -> str:
    file.seek(0)
    return file.read().decode("utf-8")


def start_feedpoint(
    *args: str | Path, cwd: Path | None = None, stdin: str | None = None, env: dict[str, str] | None = None
) -> subprocess.CompletedProcess[str]:
    """Start `python -m feedpoint ARGS` anew, as a shell does; `env` is added to the clean environment."""
    return subprocess.run(
        [sys.executable, "-m", "feedpoint", *map(str, args)],
        cwd=cwd,
        input="" if stdin is None else stdin,
        env=clean_environment() | (env or {}),
        capture_output=True,
        encoding="utf-8",
        timeout=LONGEST_S,
        check=False,
    )


def word(text: str) -> re.Pattern[str]:
    """Pattern for a short token (a letter, a figure) that must stand by itself, in its own case."""
    return re.compile(rf"(?<![\w.]){re.escape(text)}(?![\w]|\.\d)")


def says(message: str, fragment: Fragment) -> bool:
    """Whether a message contains a fragment."""
    if isinstance(fragment, tuple):
        return any(says(message, alternative) for alternative in fragment)
    if isinstance(fragment, re.Pattern):
        return fragment.search(message) is not None
    if isinstance(fragment, int):
        in_words = COUNT_WORDS.get(fragment)
        as_word = in_words is not None and re.search(rf"\b{in_words}\b", message, re.IGNORECASE) is not None
        return as_word or word(str(fragment)).search(message) is not None
    return fragment.casefold() in message.casefold()


def assert_says(message: str, fragments: Iterable[Fragment]) -> None:
    """Fail with the whole message when a fragment is not in it."""
    for fragment in fragments:
        assert says(message, fragment), f"{fragment!r} is not in {message!r}"


def assert_plain(process: subprocess.CompletedProcess[str]) -> None:
    """No traceback and no warning of the interpreter reaches a user, and no colour code a pipe."""
    for stream in (process.stdout, process.stderr):
        assert "Traceback" not in stream, stream
        assert re.search(r"\b[A-Z]\w+Warning: ", stream) is None, stream
        assert "\x1b" not in stream, stream


def assert_refused(
    process: subprocess.CompletedProcess[str], *fragments: Fragment, code: int = 3, place: str | None = None
) -> None:
    """
    The input was refused as the house does it: one line on stderr, nothing on stdout, the exit code.

    With a `place` ("dipole.s1p, line 7") the message must begin with it, and the fragments must stand in what follows.
    """
    assert_plain(process)
    assert process.returncode == code, f"exit code {process.returncode}, stderr {process.stderr!r}"
    assert process.stdout == ""
    lines = process.stderr.splitlines()
    assert len(lines) == 1, f"expected one line on stderr, found {lines}"
    start = "feedpoint: " if place is None else f"feedpoint: {place}: "
    assert lines[0].startswith(start), f"expected the message to begin with {start!r}, found {lines[0]!r}"
    assert_says(lines[0].removeprefix(start), fragments)


def assert_wrong_usage(process: subprocess.CompletedProcess[str], *fragments: Fragment) -> None:
    """
    The command line was refused: exit code 2, nothing on stdout, a message on stderr.

    How the message is framed or broken into lines is left open, so frames and line ends are taken out of it first.
    """
    assert_plain(process)
    assert process.returncode == 2, f"exit code {process.returncode}, stderr {process.stderr!r}"
    assert process.stdout == ""
    assert process.stderr.strip()
    message = " ".join(re.sub(r"[─-╿]", " ", process.stderr).split())
    assert_says(message, fragments)


def assert_done(process: subprocess.CompletedProcess[str]) -> None:
    """The command did its work; findings may stand on stderr."""
    assert_plain(process)
    assert process.returncode == 0, f"exit code {process.returncode}, stderr {process.stderr!r}"
    assert process.stdout != ""
