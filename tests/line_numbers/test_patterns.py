"""Line numbers of many shapes: what each of their tokens is, by the list's own columns and by shape.

The shapes are those of common practice; the numbers are invented.
"""

from __future__ import annotations

import math
import random
from typing import NamedTuple

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from checker.line_numbers.pattern import ParsedNumbers, parse_numbers
from checker.line_numbers.roles import ListColumns
from checker.line_numbers.tokens import coded


class Shape(NamedTuple):
    """Numbers of a list, its columns by role, the parts expected in order, and the parts of the first number."""

    numbers: tuple[str, ...]
    columns: dict[str, tuple]
    parts: str
    first: dict[str, str | float]


def listed(numbers: tuple[str, ...], columns: dict[str, tuple]) -> ListColumns:
    texts = {role: {role: coded(cells)} for role, cells in columns.items() if role != "size"}
    size = np.array(columns["size"], dtype=np.float64) if "size" in columns else None
    return ListColumns(np.arange(len(numbers), dtype=np.int32), size, texts)


def parsed(numbers: tuple[str, ...], columns: dict[str, tuple]) -> ParsedNumbers:
    return parse_numbers(numbers, listed(numbers, columns))


SHAPES = {
    "size first, insulation last": Shape(
        ('6"-P-1042-A1A-H', '2"-CW-1043-B1A-N', '1-1/2"-P-1044-A1A-H', '3/4"-IA-1045-B1A-N'),
        {"size": (6, 2, 1.5, 0.75), "service": ("P", "CW", "P", "IA"), "class": ("A1A", "B1A", "A1A", "B1A"),
         "insulation": ("H", "N", "H", "N")},
        "size - service - sequence - class - insulation",
        {"size": 6.0, "service": "P", "class": "A1A", "insulation": "H", "sequence": "1042"},
    ),
    "size as a code glued to the service, trailing dash": Shape(
        ("M-20L00001A-1800PL-AD200-", "M-20L00002A-1400PL-AD200-", "M-20L00021A-0600PV-DS200-02050Y"),
        {"size": (18, 14, 6), "service": ("PL", "PL", "PV"), "class": ("AD200", "AD200", "DS200")},
        "area - sequence - size and service - class - part",
        {"size": 18.0, "service": "PL", "class": "AD200", "sequence": "20L00001A"},
    ),
    "blanks around dashes, size in fourth place": Shape(
        ("10-1021-CA1A-12 - IH -ST", "10-1022-CA1A-8 - IC -ET", "10-1023-CB1A-6 - IH -ST"),
        {"size": (12, 8, 6), "class": ("CA1A", "CA1A", "CB1A"), "insulation": ("IH", "IC", "IH"),
         "tracing": ("ST", "ET", "ST")},
        "area - sequence - class - size - insulation - tracing",
        {"size": 12.0, "class": "CA1A", "insulation": "IH", "sequence": "1021"},
    ),
    "ampersand, bracket and placeholder digits": Shape(
        ('8"-125-S85-XXXXXX-ST&I(3")', '6"-126-S86-XXXXXX-ST&I(3")'),
        {"size": (8, 6), "class": ("S85", "S86"), "insulation": ("ST&I", "ST&I")},
        "size - sequence - class - part - insulation",
        {"size": 8.0, "class": "S85", "insulation": 'ST&I(3")'},
    ),
    "slash inside": Shape(
        ("MQ-P-201/211-0647", "MQ-P-010/211-0003", "MQ-P-010/211-0023"),
        {"size": (30, 18, 18)},
        "service - area - part - part - sequence",
        {"sequence": "0647"},
    ),
    "number only": Shape(("47121", "47122", "47123"), {"size": (3, 3, 2)}, "sequence", {"sequence": "47121"}),
    "letter and number": Shape(
        ("A2409001", "A2409002", "B2410001"), {"size": (3, 3, 2)}, "service and sequence", {"sequence": "2409001"}
    ),
    "area before the service": Shape(
        ('6"-P-HC-10001-A1A-I', '8"-P-HC-10002-A1A-I', '8"-P-CW-10003-B1A-N'),
        {"size": (6, 8, 8), "service": ("HC", "HC", "CW"), "class": ("A1A", "A1A", "B1A"),
         "insulation": ("I", "I", "N")},
        "size - area - service - sequence - class - insulation",
        {"size": 6.0, "service": "HC", "class": "A1A", "insulation": "I", "sequence": "10001"},
    ),
    "DN first": Shape(
        ("150-CWS-1001-B1A", "80-CWS-1002-B1A", "50-CWR-1003-C1A"),
        {"size": (6, 3, 2), "service": ("CWS", "CWS", "CWR"), "class": ("B1A", "B1A", "C1A")},
        "size - service - sequence - class",
        {"size": 6.0, "service": "CWS", "class": "B1A"},
    ),
    "underscores": Shape(
        ("6_P_1042_A1A", "8_P_1043_A1A", "8_P_1044_B1A"),
        {"size": (6, 8, 8), "class": ("A1A", "A1A", "B1A")},
        "size - service - sequence - class",
        {"size": 6.0, "class": "A1A"},
    ),
    "blanks": Shape(
        ('1 1/2" P 1042 A1A', '8" P 1043 A1A', '8" P 1044 B1A'),
        {"size": (1.5, 8, 8), "class": ("A1A", "A1A", "B1A")},
        "size - service - sequence - class",
        {"size": 1.5, "class": "A1A", "sequence": "1042"},
    ),
    "service and sequence glued, points": Shape(
        ("P1042.6.A1A", "P1043.8.A1A", "HC1044.8.B1A"),
        {"size": (6, 8, 8), "service": ("P", "P", "HC"), "class": ("A1A", "A1A", "B1A")},
        "service and sequence - size - class",
        {"size": 6.0, "service": "P", "class": "A1A", "sequence": "1042"},
    ),
    "dash and slash mixed": Shape(
        ('6"-P/1042-A1A', '8"-P/1043-A1A', '8"-P/1044-B1A'),
        {"size": (6, 8, 8), "class": ("A1A", "A1A", "B1A")},
        "size - service - sequence - class",
        {"size": 6.0, "class": "A1A"},
    ),
    "look-alikes": Shape(
        ('6\u2033\u2011P\u20131042\u2013\u04101\u0410', '8"-P-1043-A1A', '8"-P-1044-B1A'),
        {"size": (6, 8, 8), "class": ("A1A", "A1A", "B1A")},
        "size - service - sequence - class",
        {"size": 6.0, "class": "A1A", "sequence": "1042"},
    ),
    "no column to agree with": Shape(
        ('6"-P-1042-A1A-H', '2"-CW-1043-B1A-N'), {}, "size - service - sequence - class - insulation",
        {"size": 6.0, "service": "P", "class": "A1A", "insulation": "H", "sequence": "1042"},
    ),
}  # fmt: skip


@pytest.mark.parametrize("name", SHAPES)
def test_each_token_is_told_by_its_column_or_its_shape(name: str) -> None:
    shape = SHAPES[name]
    found = parsed(shape.numbers, shape.columns)
    assert " - ".join(found.pattern.layouts[0].parts) == shape.parts
    assert found.pattern.fitting == found.pattern.numbers == len(shape.numbers)
    mine = {role: part.text(0) for role, part in found.parts.items()} | {"size": float(found.size[0])}
    assert {role: mine[role] for role in shape.first} == shape.first
    if "size" not in shape.first:
        assert math.isnan(mine["size"])


@pytest.mark.parametrize("name", SHAPES)
def test_rows_in_another_order_give_the_same(name: str) -> None:
    shape = SHAPES[name]
    order = list(range(len(shape.numbers)))
    random.Random(3).shuffle(order)
    moved = {role: tuple(cells[place] for place in order) for role, cells in shape.columns.items()}
    found, again = parsed(shape.numbers, shape.columns), parsed(tuple(shape.numbers[i] for i in order), moved)
    assert again.pattern == found.pattern
    np.testing.assert_array_equal(again.size, found.size[order])
    for role, part in found.parts.items():
        assert [again.parts[role].text(i) for i in range(len(order))] == [part.text(i) for i in order]


def test_numbers_of_another_shape_are_outliers_and_stay_unread() -> None:
    numbers = (*(f'6"-P-10{i}-A1A-H' for i in range(20, 40)), '8"-P-xx', 'P-6"-1047-A1A-H', '2"-P-1048-01-A1A')
    count = len(numbers)
    columns = {"size": (6.0,) * 20 + (8.0, 6.0, 2.0), "class": ("A1A",) * count, "insulation": ("H",) * count}
    found = parsed(numbers, columns)
    assert found.fits.tolist() == [True] * 20 + [False] * 3
    assert found.pattern.outliers == ('2"-P-1048-01-A1A', '8"-P-XX', 'P-6"-1047-A1A-H')
    assert found.pattern.sentence == "size - service - sequence - class - insulation, 20 of 23 numbers"


def test_a_number_that_only_lacks_the_insulation_still_fits() -> None:
    numbers = (*(f'6"-P-10{i}-A1A-H' for i in range(20, 40)), '6"-P-1050-B1A')
    columns = {"size": (6.0,) * 21, "class": ("A1A",) * 20 + ("B1A",), "insulation": ("H",) * 21}
    found = parsed(numbers, columns)
    assert found.fits.all()
    assert found.parts["class"].text(20) == "B1A"
    assert found.parts["insulation"].text(20) == ""
    assert "size - service - sequence - class, 1 of 21 numbers" in found.pattern.sentence


def test_a_class_that_agrees_with_its_column_in_too_few_lines_is_in_doubt() -> None:
    numbers = tuple(f'6"-P-10{i}-A1A' for i in range(20, 30))
    found = parsed(numbers, {"size": (6.0,) * 10, "class": ("A1A", "A1A", *("CS150",) * 8)})
    assert found.pattern.doubtful == ("class",)
    assert dict(found.pattern.compared) == {"size": "size"}


NUMBERS = st.text(max_size=40) | st.from_regex(r'[0-9]{1,2}"?-[A-Z]-[0-9]{3,5}(-A1A)?', fullmatch=True)


@given(st.lists(NUMBERS, max_size=12))
def test_any_text_is_parsed_or_an_outlier(texts: list[str]) -> None:
    columns = {"size": (6.0,) * len(texts), "class": ("A1A",) * len(texts), "service": tuple(texts)}
    found = parsed(tuple(texts), columns)
    assert found.fits.shape == found.size.shape == (len(texts),)
    assert sum(layout.numbers for layout in found.pattern.layouts) == found.pattern.fitting <= found.pattern.numbers


def test_hostile_numbers_take_no_time_of_their_own() -> None:
    numbers = ("-" * 5_000, '1/2"' * 2_000, "A1" * 2_000, "((((" * 500, "9" * 10_000, "\u202e" * 300, "\x00")
    found = parsed(numbers, {"size": (6.0,) * len(numbers), "class": ("A1A",) * len(numbers)})
    assert found.pattern.numbers <= len(numbers)
