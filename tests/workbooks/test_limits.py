"""Limits of a workbook, each with its message, and workbooks damaged in every way."""

from __future__ import annotations

import io
import random
import zipfile
from pathlib import Path

import pytest
from books import line, refusal, saved, shared
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from checker.errors import InputError
from checker.intake import read_line_list
from checker.intake.workbook import limits, package, sheet_xml

LINES = [line(f"P-{number}") for number in range(1000, 1040)]


@pytest.mark.parametrize(
    ("name", "most", "words"),
    [
        ("MOST_BYTES", 500, "larger than 500 bytes"),
        ("MOST_DIRECTORY", 500, "directory is longer than 500"),
        ("MOST_PARTS", 3, "parts, more than 3"),
        ("MOST_INFLATED", 2_000, "bytes, more than 2000"),
        ("MOST_PART_INFLATED", 1_500, "bytes, more than 1500"),
        ("MOST_TAGS", 60, "sheet1.xml' holds more than 60 tags"),
        ("MOST_OTHER_TAGS", 20, "holds more than 20 tags"),
        ("DEEPEST", -1, "more than -1 deep"),
        ("LARGEST_ROW", 100, "takes more than 100 bytes"),
        ("MOST_MERGED", 1, "more than 1 merged ranges"),
    ],
)
def test_limit(tmp_path: Path, monkeypatch: pytest.MonkeyPatch, name: str, most: int, words: str) -> None:
    def change(sheet: object) -> None:
        for row in (5, 7):
            sheet.merge_cells(f"A{row}:A{row + 1}")  # type: ignore[attr-defined]

    path = saved(tmp_path, *LINES, change=change)
    monkeypatch.setattr(limits, name, most)
    if name == "LARGEST_ROW":
        monkeypatch.setattr(sheet_xml, "_CHUNK", 60)
    assert words in refusal(path)


@pytest.mark.parametrize("size", [1, 2, 3, 5, 16, 1000])
def test_tags_cut_between_pieces_are_counted_once(tmp_path: Path, monkeypatch: pytest.MonkeyPatch, size: int) -> None:
    path = saved(tmp_path, *LINES[:3])
    monkeypatch.setattr(package, "CHUNK", size)
    monkeypatch.setattr(limits, "DEEPEST", 12)
    assert len(read_line_list(path).line_number) == 3


def test_shared_texts(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    path = shared(tmp_path, *LINES)
    assert len(read_line_list(path).line_number) == len(LINES)
    monkeypatch.setattr(limits, "MOST_SHARED_TAGS", 30)
    assert "sharedStrings.xml' holds more than 30 tags" in refusal(path)


def test_ratio(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(limits, "RATIO_FROM", 1_000)
    monkeypatch.setattr(limits, "MOST_RATIO", 2)
    assert "which no real sheet does" in refusal(saved(tmp_path, *LINES))


@pytest.mark.parametrize(
    ("name", "most", "words"),
    [("MOST_ROWS", 20, "beyond row 20"), ("MOST_COLUMNS", 5, "beyond 5"), ("LONGEST_CELL", 5, "more than 5")],
)
def test_size_of_the_table(tmp_path: Path, monkeypatch: pytest.MonkeyPatch, name: str, most: int, words: str) -> None:
    path = saved(tmp_path, *LINES)
    monkeypatch.setattr(sheet_xml, name, most)
    message = refusal(path)
    assert words in message
    assert "sheet 'Line List', row" in message


@pytest.fixture(scope="module")
def sound(tmp_path_factory: pytest.TempPathFactory) -> bytes:
    return saved(tmp_path_factory.mktemp("sound"), *LINES).read_bytes()


def read_or_refused(path: Path) -> None:
    """Read a workbook, or hold its refusal to the form of every message."""
    message = ""
    try:
        assert len(read_line_list(path).line_number) > 0
    except InputError as error:
        message = str(error)
    assert message.startswith(path.name) or not message
    assert message.replace("\n", "").isprintable()


@given(seed=st.integers(min_value=0, max_value=1 << 32))
@settings(max_examples=60, deadline=None, suppress_health_check=[HealthCheck.function_scoped_fixture])
def test_damaged_bytes(sound: bytes, tmp_path: Path, seed: int) -> None:
    chance = random.Random(seed)
    content = bytearray(sound)
    for _ in range(chance.randint(1, 8)):
        content[chance.randrange(len(content))] = chance.randrange(256)
    path = tmp_path / "list.xlsx"
    path.write_bytes(bytes(content[: chance.choice([len(content), chance.randrange(len(content))])]))
    read_or_refused(path)


PIECES = [
    b"<",
    b">",
    b'"',
    b"-1",
    b"99999999999",
    b"nan",
    b"A1",
    b"ZZZ9",
    b"",
    b"\0",
    b"1e999",
    b"/>",
    b"</c>",
    b"&#0;",
]


@given(seed=st.integers(min_value=0, max_value=1 << 32))
@settings(max_examples=100, deadline=None, suppress_health_check=[HealthCheck.function_scoped_fixture])
def test_damaged_parts(sound: bytes, tmp_path: Path, seed: int) -> None:
    chance = random.Random(seed)
    with zipfile.ZipFile(io.BytesIO(sound)) as archive:
        parts = {name: archive.read(name) for name in archive.namelist()}
    name = chance.choice(sorted(parts))
    begin = chance.randrange(len(parts[name]))
    end = begin + chance.randint(0, 30)
    parts[name] = parts[name][:begin] + chance.choice(PIECES) + parts[name][end:]
    path = tmp_path / "list.xlsx"
    with zipfile.ZipFile(path, "w", zipfile.ZIP_DEFLATED) as archive:
        for name, content in parts.items():
            archive.writestr(name, content)
    read_or_refused(path)
