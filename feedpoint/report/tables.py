"""Tables of rows, 80 columns wide."""

from collections.abc import Sequence
from typing import NamedTuple

from feedpoint.report.lines import Line
from feedpoint.report.rounding import frequency_decimals, megahertz, shown
from feedpoint.result import Columns
from feedpoint.selection import Rows


class Column(NamedTuple):
    """A column of a table: the group it stands in, its head, its width, and the key of its values."""

    group: str
    head: str
    width: int
    key: str


_FREQUENCY = Column("", "MHz", 11, "frequency_hz")
_BOTH_ENDS = (
    _FREQUENCY,
    Column("shack end", "R ohm", 8, "shack_resistance_ohm"),
    Column("shack end", "X ohm", 8, "shack_reactance_ohm"),
    Column("shack end", "SWR", 7, "shack_swr"),
    Column("antenna terminals", "R ohm", 9, "feedpoint_resistance_ohm"),
    Column("antenna terminals", "X ohm", 9, "feedpoint_reactance_ohm"),
    Column("antenna terminals", "SWR", 7, "feedpoint_swr"),
    Column("antenna terminals", "RL dB", 7, "feedpoint_return_loss_db"),
    Column("total", "loss dB", 9, "total_loss_db"),
)
_SHACK_END = (
    _FREQUENCY,
    Column("shack end", "R ohm", 9, "shack_resistance_ohm"),
    Column("shack end", "X ohm", 9, "shack_reactance_ohm"),
    Column("shack end", "SWR", 8, "shack_swr"),
    Column("shack end", "RL dB", 8, "shack_return_loss_db"),
    Column("reflection", "magnitude", 11, "shack_gamma_magnitude"),
    Column("reflection", "angle deg", 11, "shack_gamma_angle_deg"),
)


def both_ends_table(rows: Rows) -> list[Line]:
    """Return the table of `deembed` and `embed`."""
    return _table(_BOTH_ENDS, rows.columns) + _closing(rows)


def shack_end_table(rows: Rows) -> list[Line]:
    """Return the table of `inspect`."""
    return _table(_SHACK_END, rows.columns) + _closing(rows)


def _table(layout: Sequence[Column], columns: Columns) -> list[Line]:
    frequencies = columns["frequency_hz"].tolist()
    decimals = frequency_decimals(frequencies)
    cells = [[megahertz(frequency, decimals) for frequency in frequencies]]
    for column in layout[1:]:
        show_value = _magnitude if column.key == "shack_gamma_magnitude" else shown
        cells.append([show_value(value) for value in columns[column.key].tolist()])
    heads = "".join(column.head.rjust(column.width) for column in layout)
    body = [
        "".join(f" {cell}".rjust(column.width) for cell, column in zip(row, layout, strict=True))
        for row in zip(*cells, strict=True)
    ]
    return [Line(_groups(layout), "bold"), Line(heads, "bold"), *(Line(text) for text in body)]


def _magnitude(value: float) -> str:
    return f"{value:.4f}"


def _groups(layout: Sequence[Column]) -> str:
    """Head of the groups, each over the columns that it joins."""
    parts = []
    for name in dict.fromkeys(column.group for column in layout):
        width = sum(column.width for column in layout if column.group == name)
        rule = width - len(name) - 3
        ruled = f" {'-' * (rule // 2)} {name} {'-' * (rule - rule // 2)}"
        parts.append(ruled if name and rule > 3 else name.rjust(width))
    return "".join(parts).rstrip()


def _closing(rows: Rows) -> list[Line]:
    if not rows.thinned:
        return []
    shown_rows = len(rows.columns["frequency_hz"])
    return [
        Line(""),
        Line(
            f"{shown_rows} telling rows of {rows.points_of_sweep} points; "
            "--all, --from, --to, --every, --at show others."
        ),
    ]
