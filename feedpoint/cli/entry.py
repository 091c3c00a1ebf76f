"""The entry of the command: the one place that turns whatever happens into a line on stderr and an exit code."""

import os
import sys
from io import TextIOWrapper

WRONG_USAGE, REFUSED, INTERRUPTED, NOT_WRITTEN = 2, 3, 130, 1


def main() -> None:
    """Run the command and end the process; nothing of what it may meet is shown as a traceback."""
    # Nobody else's package has a say in how a run sheet is read; looking for such plugins takes 15 ms besides.
    os.environ["PYDANTIC_DISABLE_PLUGINS"] = "__all__"
    _prepare_streams()
    try:
        code = _exit_code_of_command()
        sys.stdout.flush()
    except KeyboardInterrupt:
        code = INTERRUPTED
    except BrokenPipeError:
        # Whoever read our output (head, a pager) has enough.
        code = NOT_WRITTEN
    except MemoryError:
        _say("not enough memory for this.")
        code = REFUSED
    except OSError as problem:
        # Files that are read or written refuse in their own words; what is left is stdout itself.
        _say(f"the output cannot be written: {problem.strerror}.")
        code = REFUSED
    # Not sys.exit: at the end of the interpreter a stream that cannot be written to would complain once more.
    _flush_what_can_be()
    os._exit(code)


def _exit_code_of_command() -> int:
    from feedpoint.errors import FeedpointError, WrongUsage

    try:
        from feedpoint.cli.app import app

        app()
    except FeedpointError as refusal:
        sys.stdout.flush()
        _say(str(refusal))
        return WRONG_USAGE if isinstance(refusal, WrongUsage) else REFUSED
    except SystemExit as end:
        return end.code if isinstance(end.code, int) else 0
    return 0


def _prepare_streams() -> None:
    """See to it that both streams exist and take every text."""
    # A closed stream is None; what would be written to it is not wanted.
    sys.stdout = sys.stdout or open(os.devnull, "w", encoding="utf-8")  # noqa: SIM115
    sys.stderr = sys.stderr or open(os.devnull, "w", encoding="utf-8")  # noqa: SIM115
    for stream in (sys.stdout, sys.stderr):
        # A file name or comment may hold what the terminal's encoding does not.
        if isinstance(stream, TextIOWrapper):
            stream.reconfigure(errors="backslashreplace")


def _say(text: str) -> None:
    try:
        print(f"feedpoint: {text}", file=sys.stderr, flush=True)
    except OSError:
        # The exit code is all that can still be told.
        return


def _flush_what_can_be() -> None:
    for stream in (sys.stdout, sys.stderr):
        try:
            stream.flush()
        except OSError:
            continue
