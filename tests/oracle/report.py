"""
Prints the worst deviation of every quantity over all drawn cases: python -m tests.oracle.report

Columns: the largest error, the largest error in units of what was allowed there, the number of points, how many of them
needed more than the 1e-10 asked (because the file's own rounding is amplified beyond it), and where the worst one was.
"""

import sys
import tempfile
from pathlib import Path

from tests.oracle.cases import draw_cases
from tests.oracle.comparison import ASKED, QUANTITIES, compare_deembed, compare_embed, worst


def collect(compare, cases):
    """All deviations of one direction."""
    found = []
    for case in cases:
        with tempfile.TemporaryDirectory() as folder:
            found += compare(Path(folder), case)
    return found


def table_lines(title, found):
    """One line per quantity."""
    yield f"{title}: {len(found) // len(QUANTITIES)} points"
    yield f"  {'quantity':32}{'worst error':>12}{'of allowed':>12}{'> 1e-10 allowed':>17}  where"
    for quantity in QUANTITIES:
        of_this = [d for d in found if d.quantity == quantity]
        w = worst(of_this, quantity)
        relaxed = sum(d.allowed > ASKED for d in of_this)
        used = max(d.error / d.allowed for d in of_this)
        yield f"  {quantity:32}{w.error:12.1e}{used:12.4f}{relaxed:17}  {w.where}"


def main():
    """Print the table of both directions."""
    cases = draw_cases()
    for title, compare in (("deembed", compare_deembed), ("embed", compare_embed)):
        sys.stdout.write("\n".join(table_lines(title, collect(compare, cases))) + "\n")


if __name__ == "__main__":
    main()
