"""What the evaluation says of line numbers: agreement with the columns, doubled numbers, look-alikes."""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest

from checker.cautions import twin_rows
from checker.criteria.load import load_criteria
from checker.evaluation.line_number_state import mismatch_words, why_not_compared
from checker.evaluation.values import Values
from checker.intake import read_line_list

HEADER = "Line No.,Service,Size (NPS),Piping Class,Insulation,From,To,Case,Flow [kg/h]"


def values_of(folder: Path, rows: list[str], header: str = HEADER) -> Values:
    path = folder / "list.csv"
    path.write_text("\n".join([header, *rows]) + "\n", encoding="utf-8")
    criteria = load_criteria(None)
    return Values(line_list=read_line_list(path, atmosphere=criteria.atmosphere), criteria=criteria, classes=None)


def row(number: str, *, service: str = "P", size: str = '6"', pipe_class: str = "A1A", insulation: str = "H",
        start: str = "V-1", end: str = "P-1", case: str = "normal") -> str:  # fmt: skip
    cells = (number, service, size, pipe_class, insulation, start, end, case, "1000")
    return ",".join('"' + cell.replace('"', '""') + '"' for cell in cells)


def many(count: int = 8) -> list[str]:
    return [row(f'6"-P-{2000 + place}-A1A-H', start=f"V-{place}") for place in range(count)]


@pytest.mark.parametrize(
    ("odd", "state", "words"),
    [
        (row('6"-P-1042-A1A-H'), 0, ""),
        (row("6\u2033\u2011P\u20131042\u2212\u04101A-h"), 0, ""),
        (row('6"-P-1042-A1A-H', size='8"'), 1, "the number says NPS 6, the columns say NPS 8"),
        (row('1-1/2"-P-1042-A1A-H', size='2"'), 1, "the number says NPS 1 1/2, the columns say NPS 2"),
        (row('6"-P-1042-A1A-H', pipe_class="B1A"), 1, "the number says class 'A1A', the columns say class 'B1A'"),
        (row('6"-CW-1042-A1A-H'), 1, "the number says service 'CW', the columns say service 'P'"),
        (row('6"-P-1042-A1A-H', insulation="N"), 1,
         "the number says insulation 'H', the columns say insulation 'N'"),
        (row('6"-P-1042-A1A-H', size='8"', pipe_class="B1A"), 1,
         "the number says NPS 6 and class 'A1A', the columns say NPS 8 and class 'B1A'"),
        (row('6"-P-1042-A1A-H', size='8"', pipe_class=""), 1, "the number says NPS 6, the columns say NPS 8"),
    ],
)  # fmt: skip
def test_a_part_that_disagrees_with_its_column_is_told_in_words(
    tmp_path: Path, odd: str, state: int, words: str
) -> None:
    values = values_of(tmp_path, [*many(), odd])
    assert values["number_pattern_known"].tolist() == [1] * 9
    assert values["number_against_columns"].tolist() == [*[0] * 8, state]
    assert mismatch_words(values, 8) == words
    assert why_not_compared(values, 8) == ("", "")


@pytest.mark.parametrize(
    ("odd", "field", "sentence"),
    [
        (row('6"-P-1042-A1A-H', pipe_class=""), "piping_class", ""),
        (row('6"-P-1042-A1A-H', pipe_class="HOLD"), "piping_class", ""),
        (row('6"-P-1042-A1A-H', size="abc"), "size", ""),
        (row('6"-P-1042-A1A-H', insulation=""), "insulation", ""),
        (row("1042", size='8"'), "", "does not fit the pattern"),
        (row('P-6"-1042-A1A-H', pipe_class="B1A"), "", "does not fit the pattern"),
        (row('6"-P-1042-01-A1A'), "", "does not fit the pattern"),
    ],
)
def test_what_cannot_be_held_against_a_column_is_not_known(tmp_path: Path, odd: str, field: str, sentence: str) -> None:
    values = values_of(tmp_path, [*many(), odd])
    assert values["number_against_columns"].tolist() == [*[0] * 8, -1]
    said, missing = why_not_compared(values, 8)
    assert missing == field
    assert sentence in said
    assert bool(sentence) == bool(said)


def test_a_blank_class_column_leaves_every_number_unknown(tmp_path: Path) -> None:
    values = values_of(tmp_path, [row(f'6"-P-{number}-A1A-H', pipe_class="") for number in range(1000, 1006)])
    assert set(values["number_against_columns"].tolist()) == {-1}


def test_a_list_of_mere_numbers_has_nothing_to_compare(tmp_path: Path) -> None:
    values = values_of(tmp_path, [row(str(number)) for number in range(47121, 47126)])
    assert values["number_pattern_known"].tolist() == [0] * 5
    assert values["number_against_columns"].tolist() == [-1] * 5
    assert values["number_pattern"].sentence == "sequence, 5 of 5 numbers"


NUMBER = '6"-P-1042-A1A-H'


@pytest.mark.parametrize(
    ("rows", "doubled"),
    [
        ([row(NUMBER), row(NUMBER)], [True, True]),
        ([row(NUMBER), row('6 " - p-1042-A1A\u2011H')], [True, True]),
        ([row(NUMBER), row(NUMBER, case="maximum")], [False, False]),
        ([row(NUMBER), row(NUMBER, start="P-1", end="E-1")], [False, False]),
        ([row(NUMBER), row(NUMBER, size='4"')], [False, False]),
        ([row(NUMBER), row(NUMBER, start="v-1 ")], [True, True]),
        ([row(NUMBER), row(NUMBER, start="")], [True, True]),
        ([row(NUMBER, start="", end=""), row(NUMBER, start="", end="")], [True, True]),
        ([row(NUMBER), row(NUMBER, size="HOLD"), row(NUMBER, start="P-1", size='4"')], [True, True, False]),
        ([row(NUMBER), row(NUMBER, size='4"'), row(NUMBER, size='3"'), row(NUMBER)], [True, False, False, True]),
        ([row(NUMBER), row('6"-P-1O42-A1A-H')], [False, False]),
        ([row("TBA"), row("TBA"), row(NUMBER)], [False, False, False]),
    ],
)
def test_rows_that_nothing_tells_apart_are_doubled(tmp_path: Path, rows: list[str], doubled: list[bool]) -> None:
    values = values_of(tmp_path, rows)
    assert values["doubled_line_number"].tolist() == doubled
    assert bool(twin_rows(values)) == any(doubled)


def test_segments_of_lines_are_no_doubled_numbers(tmp_path: Path) -> None:
    """33 rows under 16 numbers, each row its own from and to: common practice."""
    rows = [row(f'6"-P-{1000 + place % 16}-A1A-H', start=f"S-{place}", end=f"S-{place + 1}") for place in range(33)]
    values = values_of(tmp_path, rows)
    assert not values["doubled_line_number"].any()
    assert len(set(values["line_group"].tolist())) == 16


def test_the_ends_of_a_range_are_no_doubled_numbers(tmp_path: Path) -> None:
    header = "Line No.,Size (NPS),Pressure [barg],Flow [kg/h]"
    values = values_of(tmp_path, ['"6""-P-1042-A1A","6""",5-7,1000', '"6""-P-1043-A1A","6""",5,1000'], header)
    assert not values["doubled_line_number"].any()


@pytest.mark.parametrize(
    ("other", "words"),
    [
        ('6"-P-1O42-A1A-H', "character 7 is a capital O in the first and a zero in the second"),
        ("6\"-P-1042-\u04101A-H", "U+0410 CYRILLIC CAPITAL LETTER A"),
        ('6"-P\u20111042-A1A-H', "U+2011 NON-BREAKING HYPHEN"),
        ('6"-P-1042-A1A-H (Rev B)', "stands in the first only"),
    ],
)  # fmt: skip
def test_a_number_that_looks_like_another_is_told_with_the_characters(tmp_path: Path, other: str, words: str) -> None:
    values = values_of(tmp_path, [row(NUMBER), row('6"-P-1043-A1A-H'), row(other)])
    assert values["look_alike_number"].tolist() == [True, False, True]
    assert words in values["look_alike_said"].text(2)
    assert values["look_alike_said"].text(1) == ""


@pytest.mark.parametrize("seed", range(4))
def test_rows_in_another_order_say_the_same(tmp_path: Path, seed: int) -> None:
    rows = [
        *many(12), row(NUMBER), row(NUMBER), row(NUMBER, start=""), row('6"-P-1O42-A1A-H', size='8"'), row("47121"),
        row('6"-P-3000-A1A'), row('6"-P-3001-B1A-H', pipe_class="HOLD"), row('8"-P-3002-A1A-H'),
    ]  # fmt: skip
    order = np.random.default_rng(seed).permutation(len(rows))
    first, again = values_of(tmp_path, rows), values_of(tmp_path, [rows[place] for place in order])
    for name in ("number_against_columns", "doubled_line_number", "look_alike_number", "number_size"):
        np.testing.assert_array_equal(again[name], first[name][order])
    assert again["number_pattern"] == first["number_pattern"]
    for name in ("number_mismatch_said", "look_alike_said", "number_class"):
        assert [again[name].text(i) for i in range(len(rows))] == [first[name].text(int(i)) for i in order]
