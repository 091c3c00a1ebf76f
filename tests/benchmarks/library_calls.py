"""
Calls of `feedpoint.deembed` a second: 401 points, two sections, findings included, one core.

    python -m tests.benchmarks.library_calls
"""

import statistics
import tempfile
import time
from pathlib import Path

import feedpoint
from tests.benchmarks.inputs import write_inputs

CALLS, ROUNDS = 500, 9


def main() -> None:
    with tempfile.TemporaryDirectory() as folder:
        sweep_file, sheet = write_inputs(Path(folder), 401)
        sweep, run = feedpoint.read_sweep(sweep_file), feedpoint.read_run_sheet(sheet)
    rates = []
    for _ in range(ROUNDS):
        started = time.perf_counter()
        for _ in range(CALLS):
            result = feedpoint.deembed(sweep, run)
        rates.append(CALLS / (time.perf_counter() - started))
    print(f"deembed, 401 points, 2 sections: {statistics.median(rates):.0f} calls/s (at least 1500)")
    started = time.perf_counter()
    _ = (result.landmarks, result.shack_landmarks, result.columns)
    print(f"landmarks of both ends and all columns of one result: {1e3 * (time.perf_counter() - started):.1f} ms")


if __name__ == "__main__":
    main()
