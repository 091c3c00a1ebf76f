"""
Whole-process time and memory of the command, against a script of twenty lines and against importing numpy.

    python -m tests.benchmarks.whole_process [RUNS]

Commands are run in turn (A B C A B C ...), so that a drift of the machine's speed meets all of them; ratios are taken
run by run, and medians are printed. Time is user plus system time of the child, memory its largest resident set.
"""

import os
import statistics
import subprocess
import sys
import tempfile
from pathlib import Path

from tests.benchmarks.inputs import write_inputs

PYTHON = sys.executable
SCRIPT = str(Path(__file__).with_name("with_networks.py"))


def measured(command: list[str]) -> tuple[float, float]:
    """Process time [s] and peak memory [MiB] of one run of a command."""
    with subprocess.Popen(command, stdout=subprocess.DEVNULL, stderr=subprocess.DEVNULL) as process:
        _, status, usage = os.wait4(process.pid, 0)
        process.returncode = os.waitstatus_to_exitcode(status)
    if process.returncode != 0:
        raise SystemExit(f"{command} failed with {process.returncode}")
    return usage.ru_utime + usage.ru_stime, usage.ru_maxrss / 1024.0


def main(runs: int) -> None:
    with tempfile.TemporaryDirectory() as folder:
        sweep, sheet = map(str, write_inputs(Path(folder)))
        command = [PYTHON, "-m", "feedpoint", "deembed", sweep, "--run", sheet]
        commands = {
            "import numpy": [PYTHON, "-c", "import numpy"],
            "script": [PYTHON, SCRIPT, sweep, sheet],
            "deembed": command,
            "deembed --all": [*command, "--all"],
            "--help": [PYTHON, "-m", "feedpoint", "--help"],
        }
        for each in commands.values():
            measured(each)
        results = [{name: measured(each) for name, each in commands.items()} for _ in range(runs)]
    for name in commands:
        seconds = statistics.median(result[name][0] for result in results)
        memory = max(result[name][1] for result in results)
        print(f"{name:<16}{seconds:8.3f} s  {memory:7.1f} MiB")
    for name, other, limit in (
        ("deembed", "script", 0.6),
        ("deembed --all", "script", 1.2),
        ("deembed", "import numpy", 4.0),
        ("--help", "import numpy", 2.5),
    ):
        ratio = statistics.median(result[name][0] / result[other][0] for result in results)
        print(f"{name} / {other}: {ratio:.2f} (at most {limit})")


if __name__ == "__main__":
    main(int(sys.argv[1]) if len(sys.argv) > 1 else 15)
