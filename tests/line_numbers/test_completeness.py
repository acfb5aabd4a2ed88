"""The list against the lines on the drawings: what is missing, renumbered, spelled otherwise, or shown elsewhere."""

from __future__ import annotations

import random
from pathlib import Path

import openpyxl
import pytest
from hypothesis import given
from hypothesis import strategies as st

from checker.completeness import Completeness, compare, read_drawing_lines
from checker.completeness.near import near_pairs
from checker.completeness.record import (
    DELETED,
    KINDS,
    NOT_IN_LIST,
    NOT_ON_DRAWINGS,
    OTHER_DRAWING,
    OTHER_SPELLING,
    RENUMBERED,
)
from checker.errors import InputError
from checker.intake import read_line_list
from checker.model import LineList

LINES = (
    ('6"-P-1001-A1A', "MQ-10-PID-0101"),
    ('6"-P-1002-A1A', "MQ-10-PID-0101; MQ-10-PID-0102"),
    ('8"-P-1003-A1A', "MQ-10-PID-0102"),
    ('8"-CW-1004-B1A', ""),
)


def quoted(cell: str) -> str:
    return '"' + cell.replace('"', '""') + '"'


def line_list(folder: Path, lines: tuple[tuple[str, str], ...] = LINES, *, remark: str = "") -> LineList:
    rows = [f"{quoted(number)},{quoted(drawing)},1000,\n" for number, drawing in lines]
    path = folder / "list.csv"
    path.write_text("Line No,P&ID,Flow [kg/h],Remarks\n" + "".join(rows) + remark, encoding="utf-8")
    return read_line_list(path)


def drawings_file(folder: Path, rows: list[tuple[str, str]], name: str = "drawings.csv") -> Path:
    path = folder / name
    text = "".join(f"{quoted(number)},{quoted(drawing)}\n" for number, drawing in rows)
    path.write_text("Line No,Drawing No\n" + text, encoding="utf-8")
    return path


def compared(folder: Path, rows: list[tuple[str, str]], **given: str) -> Completeness:
    return compare(line_list(folder, **given), read_drawing_lines(drawings_file(folder, rows)))


SAME = [
    ("6-p-1001-a1a", "MQ-10-PID-0101"),
    ('6"\u2011P\u20131002\u2212A1A', "MQ-10-PID-0102"),
    ('6"-P-1002-A1A', "MQ-10-PID-0103"),
    ('8" - P - 1003 - A1A', "mq-10-pid-0102"),
    ('8"-CW-1004-B1A', "MQ-10-PID-0104"),
]


def test_the_same_lines_however_written_leave_nothing_to_say(tmp_path: Path) -> None:
    found = compared(tmp_path, SAME)
    assert (found.listed, found.drawn, found.both, found.items) == (4, 4, 4, ())
    assert found.complete
    assert found.sentence == "4 lines on the drawings and 4 in the list, 4 of them the same: nothing differs."


@pytest.mark.parametrize(
    ("change", "kinds", "words"),
    [
        ({4: None}, {NOT_ON_DRAWINGS: 1}, "'8\"-CW-1004-B1A' is in the list, but not on the drawings."),
        (
            {5: ('2"-DR-9000-C1A', "MQ-1")},
            {NOT_IN_LIST: 1},
            "is on the drawings (drawing 'MQ-1'), but not in the list.",
        ),
        ({3: ('8"-P-1003-A1A', "MQ-10-PID-0199")}, {OTHER_DRAWING: 1}, "stands on 'MQ-10-PID-0102' by the list"),
        ({0: ('6"-P-1OO1-A1A', "MQ-10-PID-0101")}, {OTHER_SPELLING: 1}, "character 7 is a zero in the list"),
        ({4: ('8"-CW-1009-B1A', "")}, {RENUMBERED: 1, NOT_IN_LIST: 1, NOT_ON_DRAWINGS: 1}, "Perhaps the same as"),
        ({4: ('8"-CW-1040-B1A', "")}, {RENUMBERED: 1, NOT_IN_LIST: 1, NOT_ON_DRAWINGS: 1}, "one slip in the sequence"),
        (
            {4: ('10"-CW-1004-B1A', "")},
            {RENUMBERED: 1, NOT_IN_LIST: 1, NOT_ON_DRAWINGS: 1},
            "the same but for one part",
        ),
        (
            {4: ('8"-CW-1004-B1A-H', "")},
            {RENUMBERED: 1, NOT_IN_LIST: 1, NOT_ON_DRAWINGS: 1},
            "on the drawings only: 'H'",
        ),
        ({4: ("8CW1004B1A", "")}, {RENUMBERED: 1, NOT_IN_LIST: 1, NOT_ON_DRAWINGS: 1}, "delimiters and marks"),
        ({4: ('8"-CW-7777-B1A', "")}, {NOT_IN_LIST: 1, NOT_ON_DRAWINGS: 1}, "not in the list."),
    ],
)
def test_each_difference_is_told_with_both_numbers(
    tmp_path: Path, change: dict[int, tuple[str, str] | None], kinds: dict[str, int], words: str
) -> None:
    rows = dict(enumerate(SAME)) | change
    found = compared(tmp_path, [row for row in rows.values() if row])
    assert {kind: count for kind, count in found.counts.items() if count} == kinds
    assert any(words in item.sentence for item in found.items)
    assert not found.complete
    assert list(found.counts) == list(KINDS)


def test_a_deleted_line_that_the_drawings_still_show_is_told(tmp_path: Path) -> None:
    remark = '"4""-P-1005-A1A",MQ-10-PID-0102,,DELETED\n"4""-P-1006-A1A",MQ-10-PID-0102,,DELETED\n'
    found = compared(tmp_path, [*SAME, ('4"-P-1005-A1A', "MQ-10-PID-0102")], remark=remark)
    assert [(item.kind, item.line_number) for item in found.items] == [(DELETED, '4"-P-1005-A1A')]
    assert "deleted in the list" in found.items[0].sentence


def test_items_name_their_rows_and_make_a_table(tmp_path: Path) -> None:
    found = compared(tmp_path, [*SAME[:4], ('2"-DR-9000-C1A', "MQ-1")])
    missing = {item.kind: item for item in found.items}
    assert (missing[NOT_IN_LIST].row, missing[NOT_IN_LIST].drawing_row) == (0, 6)
    assert (missing[NOT_ON_DRAWINGS].row, missing[NOT_ON_DRAWINGS].drawing_row) == (5, 0)
    frame = found.frame()
    assert list(frame["kind"]) == [NOT_IN_LIST, NOT_ON_DRAWINGS]
    assert list(compared(tmp_path, SAME).frame().columns) == list(frame.columns)


@pytest.mark.parametrize(
    "text",
    [
        '6"-P-1001-A1A\n8"-P-1003-A1A\n',
        'Pipes\n6"-P-1001-A1A\n8"-P-1003-A1A\n',
        '\n\n6"-P-1001-A1A\n\n8"-P-1003-A1A\n',
        'Line No;Dwg\n"6""-P-1001-A1A";D1\n"8""-P-1003-A1A";D2\n',
        'Drawing list\n\nP&ID\tLine Number\nD1\t"6""-P-1001-A1A"\nD2\t"8""-P-1003-A1A"\nTotal\t2\n',
    ],
)
def test_files_of_every_form_give_the_same_lines(tmp_path: Path, text: str) -> None:
    path = tmp_path / "d.csv"
    path.write_bytes(text.encode("utf-16") if "Dwg" in text else text.encode())
    found = read_drawing_lines(path)
    assert found.numbers[:2] == ('6"-P-1001-A1A', '8"-P-1003-A1A')
    assert found.drawings[:2] == (("D1", "D2") if "D1" in text else ("", ""))
    assert any("no drawings" in note.lower() or "D1" in text for note in found.notes)


def test_a_workbook_is_read_too(tmp_path: Path) -> None:
    book = openpyxl.Workbook()
    for row in (("Line No", "P&ID"), ('6"-P-1001-A1A', "D1"), ('8"-P-1003-A1A', "D2")):
        book.active.append(row)
    book.save(tmp_path / "d.xlsx")
    assert read_drawing_lines(tmp_path / "d.xlsx").drawings == ("D1", "D2")


@pytest.mark.parametrize(
    ("text", "words"),
    [
        ("", "empty"),
        ("Line No,Drawing\n", "no lines"),
        ("Line No,Drawing\n,D1\n", "no lines"),
        ("a,b\n1,2\n", "no table found"),
        ("Pipes\n\n", "no table found"),
        ("Line No,Drawing,P&ID\nP-1,D1,D2\n", "two columns name the drawing"),
        ('Line No,Drawing\nP-1,"D1\nP-2,D2\n', "not closed"),
        ("Line No,Drawing\nP-1,D1,x,y\n", "row has 4 cells"),
        ('Line No,Drawing\n"P-1001-A1A\nP-1002-A1A",D1\n', "two line numbers"),
    ],
)
def test_a_file_that_cannot_be_told_is_refused_with_its_place(tmp_path: Path, text: str, words: str) -> None:
    path = tmp_path / "d.csv"
    path.write_text(text, encoding="utf-8")
    with pytest.raises(InputError) as raised:
        read_drawing_lines(path)
    assert words in str(raised.value)
    assert "d.csv" in str(raised.value)


def test_rows_without_a_line_number_are_listed_and_keep_the_list_from_being_complete(tmp_path: Path) -> None:
    found = compared(tmp_path, [*SAME, ("", "MQ-10-PID-0105")])
    assert len(found.unread) == 1
    assert not found.complete
    assert "1 row of the drawings' file not read" in found.sentence


def test_near_numbers_are_found_among_thousands_and_each_is_paired_once() -> None:
    listed = [f'6"-P-{number}-A1A' for number in range(10_000, 13_000)]
    drawn = [f'6"-P-{number}-B1A' for number in range(10_000, 13_000)]
    random.Random(1).shuffle(drawn)
    pairs = near_pairs(listed, drawn)
    assert len(pairs) == len({pair.first for pair in pairs}) == len({pair.second for pair in pairs}) == 3_000
    assert all(listed[pair.first].replace("A1A", "B1A") == drawn[pair.second] for pair in pairs)


@given(st.lists(st.text(alphabet='0123456"-PAO \u2011\u0410/()', min_size=1, max_size=14), max_size=8), st.randoms())
def test_any_numbers_are_paired_at_most_once_and_in_any_order(numbers: list[str], shuffler: random.Random) -> None:
    first, second = numbers[::2], numbers[1::2]
    pairs = {(first[pair.first], second[pair.second]) for pair in near_pairs(first, second)}
    moved = shuffler.sample(first, len(first)), shuffler.sample(second, len(second))
    assert {(moved[0][pair.first], moved[1][pair.second]) for pair in near_pairs(*moved)} == pairs


def test_rows_in_another_order_say_the_same(tmp_path: Path) -> None:
    rows = [*SAME[:3], ('8"-CW-1009-B1A', "D1"), ('2"-DR-9000-C1A', "D2")]
    found = compared(tmp_path, rows)
    again = compare(line_list(tmp_path, LINES[::-1]), read_drawing_lines(drawings_file(tmp_path, rows[::-1])))

    def told(each: Completeness) -> list[tuple[str, str]]:
        return sorted((item.kind, item.sentence) for item in each.items)

    assert told(again) == told(found)
