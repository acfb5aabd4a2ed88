"""Plain numbers read many at once are what `float` makes of them, to the last bit, or are left to the slow path."""

from __future__ import annotations

import math
import re
from pathlib import Path

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from lists import read

from checker.intake.cells import NumberCollector, collect_numbers
from checker.intake.plain_numbers import Mark, read_plain
from checker.model import Gap

#: A power of ten far below any value of a line, which `float` may take for zero.
TINY = re.compile(r"[eE]-\d{3,}", re.ASCII)
SHAPE = re.compile(r"(?![-+]?0\d+(?:[eE]|$))[-+]?(\d+([.,]\d*)?|[.,]\d+)([eE][-+]?\d{1,4})?", re.ASCII)
SIGNS = "0123456789.,+-eE_ x\u0663\u00bd"
NUMBERS = st.one_of(
    st.floats(allow_nan=False, allow_infinity=False).map(repr),
    st.floats(-1e6, 1e6).map(lambda value: f"{value:.5g}"),
    st.floats(-1e6, 1e6).map(lambda value: f"{value:.3f}"),
    st.decimals(allow_nan=False, allow_infinity=False, places=6).map(str),
    st.integers(-(10**17), 10**17).map(str),
    st.text(SIGNS, max_size=12),
    st.sampled_from(
        [
            "",
            " ",
            "nan",
            "inf",
            "HOLD",
            "1_000",
            "5.",
            ".5",
            "1e400",
            "1e-400",
            "007",
            "-05",
            "-0",
            "1,234",
            "12.345",
            "0,234",
        ]
    ),
)


def collected(texts: list[str]) -> NumberCollector:
    collector = NumberCollector()
    collect_numbers([collector], [texts])
    return collector


@settings(max_examples=300, deadline=None)
@given(st.lists(NUMBERS, min_size=1, max_size=30))
def test_many_at_once_are_what_float_makes_of_each(texts: list[str]) -> None:
    cells = collected(texts).cells()
    assert list(cells) == texts
    assert [cells[index] for index in range(len(texts))] == texts
    assert cells.at(range(len(texts))) == texts
    for text, value, code, mark in zip(texts, cells.numbers, cells.codes, cells.marks, strict=True):
        bare = text.strip(" ")
        expected = float(bare.replace(",", ".")) if SHAPE.fullmatch(bare) else math.nan
        if TINY.search(bare) and math.isnan(value):
            expected = math.nan
        if math.isfinite(expected) and len(text) <= 60:
            assert value == expected
            assert code == -1
            assert (mark in (Mark.COMMA, Mark.COMMA_OR_THOUSANDS)) == ("," in bare)
            assert (mark in (Mark.POINT, Mark.POINT_OR_THOUSANDS)) == ("." in bare)
        else:
            assert math.isnan(value)
            assert cells.texts[code] == text


@settings(max_examples=200, deadline=None)
@given(st.lists(NUMBERS, min_size=2, max_size=30), st.data())
def test_rows_kept_keep_their_cells(texts: list[str], data: st.DataObject) -> None:
    keep = np.array(data.draw(st.lists(st.booleans(), min_size=len(texts), max_size=len(texts))))
    whole = collected(texts).cells()
    kept = whole.kept(keep)
    assert list(kept) == [text for text, chosen in zip(texts, keep, strict=True) if chosen]
    assert np.array_equal(kept.numbers, whole.numbers[keep], equal_nan=True)
    again = kept.kept(np.arange(len(kept)) % 2 == 0)
    assert list(again) == list(kept)[::2]
    assert list(kept[1:]) == list(kept)[1:]
    assert len(kept) == 0 or kept[-1] == list(kept)[-1]


def test_marks_that_may_part_thousands() -> None:
    texts = ["1,234", "-12.345", "123,456", "0,234", "1,2345", "1234,567", "12,34", "1.234e2", " 1,234 ", "12"]
    marks = collected(texts).cells().marks.tolist()
    assert marks == [4, 3, 4, 2, 2, 2, 2, 1, 4, 0]


def test_blank_runs_and_exponents_without_numbers() -> None:
    plain = read_plain("\0\0e5\0\0005e\0e\0\0007\0")
    assert plain.blank.tolist() == [True, True, False, True, False, False, True, False]
    assert plain.values[-1] == 7.0
    assert np.isnan(plain.values[:-1]).all()


def test_a_nul_in_a_cell_moves_no_other() -> None:
    cells = collected(["1", "2\x003", "4"]).cells()
    assert cells.numbers.tolist()[::2] == [1.0, 4.0]
    assert len(cells) == 3


def test_numbers_that_could_become_zero_and_those_with_noughts_before_them_are_left_to_the_slow_path() -> None:
    odd = ["1e-400", " 1e-400", "2.5E-330", "007", "05", " 05 ", "-05", "+007", "007e2", "00"]
    cells = collected([*odd, "0", "0.5", "0.0", "00.5", "1e-100", "0e-5"]).cells()
    assert [cells.texts[code] for code in cells.codes[: len(odd)]] == odd
    assert cells.numbers[len(odd) :].tolist() == [0.0, 0.5, 0.0, 0.5, 1e-100, 0.0]


@pytest.mark.parametrize("cell", ["1e-400", "1E-330", "10^-400", "007", "05", "-05"])
def test_they_are_refused_in_a_list(tmp_path: Path, cell: str) -> None:
    listed = read(tmp_path, f"Line No,Flow [kg/h],dz [m]\nP-1,5,{cell}\nP-2,5,0\nP-3,5,0.5\n")
    assert listed.gap("elevation_change").tolist() == [Gap.REFUSED, Gap.GIVEN, Gap.GIVEN]
