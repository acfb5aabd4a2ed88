"""Every list of the corpus reads as its file says: SI values, gaps, refusals, or the sentence that refuses the file.

A file of `lists/` holds one small invented list as a contractor would send it, the traits it shows, and what a careful
engineer would read from it. Nothing else of the program is consulted for the expected values.
"""

from __future__ import annotations

import tomllib
from pathlib import Path
from typing import Any

import pytest
from corpus_files import written

from checker.criteria.hints import ColumnHint
from checker.errors import InputError
from checker.intake import read_line_list
from checker.model import Gap, LineList

LISTS = Path(__file__).parent / "lists"
FILES = sorted(LISTS.glob("*.toml"))
ATMOSPHERE = 101_325.0
AMBIENT = (268.15, 305.15)


def _loaded(path: Path) -> dict[str, Any]:
    with path.open("rb") as handle:
        return tomllib.load(handle)


def _read(entry: dict[str, Any], folder: Path) -> LineList:
    given = entry.get("given", {})
    hints = {
        header: ColumnHint(field=says.get("field", ""), unit=says.get("unit", ""), case=says.get("case", ""))
        for header, says in given.get("columns", {}).items()
    }
    return read_line_list(
        written(entry, folder),
        units=given.get("units", {}),
        columns=hints,
        atmosphere=ATMOSPHERE,
        ambient=AMBIENT if given.get("ambient", True) else None,
        sheet=given.get("sheet"),
    )


def _place(listed: LineList, where: dict[str, Any]) -> int:
    """Return the line case that an expectation speaks of."""
    wanted, case = where["line"], where.get("case")
    found = [
        index
        for index in range(listed.line_cases)
        if listed.line_number[int(listed.line[index])] == wanted
        and (case is None or listed.case.text(index) == case)
        and ("row" not in where or int(listed.row[int(listed.line[index])]) == where["row"])
    ]
    assert len(found) == 1, f"{where}: {len(found)} line cases of {sorted(set(listed.case.texts))}"
    return found[0]


def _check_value(listed: LineList, value: dict[str, Any]) -> None:
    index = _place(listed, value)
    field = value["field"]
    assert listed.has(field), f"no column for {field}: {[match for match in listed.matching]}"
    assert Gap(int(listed.gap(field)[index])) is Gap.GIVEN, (value, listed.refusals.get((field, index)))
    if "text" in value:
        assert listed.text(field).text(index) == value["text"]
    else:
        assert float(listed.number(field)[index]) == pytest.approx(value["si"], rel=value.get("within", 1e-9))


def _check_gap(listed: LineList, gap: dict[str, Any]) -> None:
    index = _place(listed, gap)
    field = gap["field"]
    assert Gap(int(listed.gap(field)[index])) is Gap[gap["gap"]], (gap, listed.number(field)[index])
    sentence = listed.refusals.get((field, index), "")
    for word in gap.get("words", ()):
        assert word in sentence, (gap, sentence)


def _check_all(listed: LineList, expected: dict[str, Any]) -> None:
    if "lines" in expected:
        assert list(listed.line_number) == expected["lines"]
    if "cases" in expected:
        assert list(dict.fromkeys(listed.case.text(index) for index in range(listed.line_cases))) == expected["cases"]
    if "deleted" in expected:
        assert [item.line_number for item in listed.deleted] == expected["deleted"]
    if "holds" in expected:
        assert [[item.line_number, item.field] for item in listed.holds] == expected["holds"]
    if "ranges" in expected:
        assert [[item.line_number, item.field] for item in listed.ranges] == expected["ranges"]
    said = {
        "notes": "\n".join(listed.notes),
        "unread": "\n".join(item.reason for item in listed.unread),
        "unmatched": "\n".join(listed.unmatched),
    }
    for name, text in said.items():
        for word in expected.get(name, ()):
            assert word.casefold() in text.casefold(), (name, word, text)
    for field in expected.get("without", ()):
        assert not listed.has(field), field


@pytest.mark.parametrize("path", FILES, ids=lambda path: path.stem)
def test_list_reads_as_its_file_says(path: Path, tmp_path: Path) -> None:
    entry = _loaded(path)
    if "refused" in entry:
        with pytest.raises(InputError) as refusal:
            _read(entry, tmp_path)
        for word in entry["refused"]:
            assert word.casefold() in str(refusal.value).casefold()
        return
    listed = _read(entry, tmp_path)
    for value in entry.get("value", ()):
        _check_value(listed, value)
    for gap in entry.get("gap", ()):
        _check_gap(listed, gap)
    _check_all(listed, entry.get("expect", {}))


def test_corpus_is_large_and_says_what_it_shows() -> None:
    assert len(FILES) >= 40
    for path in FILES:
        entry = _loaded(path)
        assert entry["shows"], path
        assert entry.get("value") or entry.get("gap") or entry.get("refused") or entry.get("expect"), path
