"""What may not matter: the units a list is written in, the order of its rows, the lines beside a line."""

from __future__ import annotations

import random
from typing import Any

import numpy as np
import pytest
from example_rows import Outcomes, copied_rows, example_outcomes, header_and_rows, outcomes_of, reviewed
from hypothesis import given, settings
from hypothesis import strategies as st

HEADER, ROWS = header_and_rows()

# Exact by definition: the international pound (0.45359237 kg), foot (0.3048 m) and inch, standard gravity
# (9.80665 m/s2); psi = lbf/in2. ISO 80000 and NIST SP 811.
PSI = 0.45359237 * 9.80665 / 0.0254**2
SCALINGS = {
    "kg/h": ("lb/h", 1.0 / 0.45359237, 0.0),
    "barg": ("psig", 1e5 / PSI, 0.0),
    "bara": ("psia", 1e5 / PSI, 0.0),
    "bar": ("psi", 1e5 / PSI, 0.0),
    "°C": ("°F", 1.8, 32.0),
    "kg/m³": ("lb/ft3", 0.3048**3 / 0.45359237, 0.0),
    "m": ("ft", 1.0 / 0.3048, 0.0),
    "m/s": ("ft/s", 1.0 / 0.3048, 0.0),
    "cP": ("Pa.s", 1e-3, 0.0),
    "m³/h": ("L/s", 1.0 / 3.6, 0.0),
    "mN/m": ("N/m", 1e-3, 0.0),
}


# They hold a row against the other rows of the list.
OF_THE_LIST = {"doubled-line-number", "look-alike-number", "number-against-columns", "aged-hold"}


def _scaled(cell: str, factor: float, shift: float) -> str:
    first, stroke, vacuum = cell.partition("/FV")
    try:
        return f"{float(first) * factor + shift!r}{stroke}{vacuum}"
    except ValueError:
        return cell


def _unit(title: str) -> str:
    return title.rpartition("[")[2].rstrip("]") if title.endswith("]") else ""


@pytest.mark.parametrize("unit", [*SCALINGS, "all of them"])
def test_the_units_of_the_list_change_no_outcome(unit: str) -> None:
    header, rows = list(HEADER), copied_rows()
    for column, title in enumerate(HEADER):
        mine = _unit(title)
        if mine in SCALINGS and unit in (mine, "all of them"):
            word, factor, shift = SCALINGS[mine]
            header[column] = title.replace(f"[{mine}]", f"[{word}]")
            for row in rows:
                row[column] = _scaled(row[column], factor, shift)
    assert header != list(HEADER)
    assert outcomes_of(reviewed(rows, header=header)) == example_outcomes()


@settings(max_examples=8, deadline=None)
@given(seed=st.integers(0, 2**32 - 1))
def test_the_order_of_rows_changes_no_outcome(seed: int) -> None:
    rows = copied_rows()
    random.Random(seed).shuffle(rows)
    assert outcomes_of(reviewed(rows)) == example_outcomes()


@settings(max_examples=8, deadline=None)
@given(seed=st.integers(0, 2**32 - 1))
def test_the_order_of_columns_changes_no_outcome(seed: int) -> None:
    order = list(range(len(HEADER)))
    random.Random(seed).shuffle(order)
    shuffled = [[row[column] for column in order] for row in ROWS]
    assert outcomes_of(reviewed(shuffled, header=[HEADER[column] for column in order])) == example_outcomes()


@settings(max_examples=25, deadline=None)
@given(index=st.integers(0, len(ROWS) - 1))
def test_one_line_alone_is_the_same_as_among_all(index: int) -> None:
    """The numbers too, bit for bit: no result may depend on the lines beside it."""
    alone, among = reviewed([ROWS[index]]), _among()
    cases = np.flatnonzero(among.values.line_list.line == index)
    for name, _, values in among.hydraulics_columns():
        mine = next(column for key, _, column in alone.hydraulics_columns() if key == name)
        assert np.array_equal(mine, values[cases], equal_nan=True), name
    outcomes: Outcomes = {key: word for key, word in outcomes_of(alone).items() if key[2] not in OF_THE_LIST}
    assert outcomes == {key: example_outcomes()[key] for key in outcomes}


def _among() -> Any:
    if not _HELD:
        _HELD.append(reviewed(ROWS))
    return _HELD[0]


_HELD: list[Any] = []
