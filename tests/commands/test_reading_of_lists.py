"""What the commands say of how a list was read, and which sheet of a workbook they read."""

from __future__ import annotations

import json
from collections.abc import Callable
from pathlib import Path

import openpyxl
import pytest
from click.testing import CliRunner, Result

from checker.cli import main

HEADER = (
    "Line No.", "Service", "Phase", "Size (NPS)", "Sch.", "Flow [kg/h]", "Oper. Press. [barg]", "Oper. Temp. [degC]",
    "Density [kg/m3]", "Viscosity [cP]", "Length [m]", "Fittings", "Elev. Change [m]", "Material", "Remarks", "Paint",
)  # fmt: skip
LINE = ("pump discharge", "L", "6", "40", "100000", "4 to 5", "25", "997", "0.89", "50", "none", "0", "carbon steel")
ROWS = (
    ("L-1", *LINE, "", "P1"),
    ("L-2", *LINE, "DELETED", ""),
    ("L-3", *LINE[:4], "<90000", *LINE[5:], "", ""),
)


def run(*arguments: str) -> Result:
    return CliRunner().invoke(main, list(arguments))


@pytest.fixture
def text(tmp_path: Path) -> Path:
    path = tmp_path / "list.csv"
    path.write_text("\n".join(";".join(row) for row in (HEADER, *ROWS)) + "\n", encoding="utf-8")
    return path


@pytest.fixture
def book(tmp_path: Path) -> Path:
    made = openpyxl.Workbook()
    for name, rows in (("Rev B", ROWS[:1]), ("Rev C", ROWS)):
        sheet = made.create_sheet(name)
        for row in (HEADER, *rows):
            sheet.append(row)
    made.remove(made["Sheet"])
    path = tmp_path / "list.xlsx"
    made.save(path)
    return path


def test_review_tells_how_the_list_was_read(text: Path, tmp_path: Path) -> None:
    result = run("review", str(text), "--out", str(tmp_path / "out"), "--quiet")
    assert result.exit_code == 0
    lines = result.stdout.splitlines()
    assert lines[0].startswith("checked ")
    said = " ".join(result.stdout.split())
    for part in ("semicolon", "Headers in row 1", "Flow [kg/h] -> flow_mass, kg/h", "Paint", "1 deleted line", "L-2"):
        assert part in said, part
    document = json.loads((tmp_path / "out" / "outcomes.json").read_text(encoding="utf-8"))
    assert document["counts"]["lines"] == 2
    assert [item["line_number"] for item in document["reading"]["deleted"]] == ["L-2"]
    assert sum(document["tally"].values()) == document["counts"]["line_cases"] * document["counts"]["rules"]
    assert "deleted by their originator" in (tmp_path / "out" / "exceptions.html").read_text(encoding="utf-8")


def test_gate_says_its_short_answer_only(text: Path) -> None:
    result = run("gate", str(text))
    assert "How the list was read" not in result.stdout
    assert len(result.stdout.splitlines()) < 15


def test_the_calculation_shows_number_unit_si_value_and_address(text: Path) -> None:
    sheet = " ".join(run("calculation", str(text), "L-1").stdout.split())
    assert "written '100000', read as 100000 kg/h = 27.7778 kg/s, list.csv, row 2, column 'Flow [kg/h]'" in sheet
    assert "read as 4 and 5 barg = 501325 and 601325 Pa absolute" in sheet
    assert "Cells with two values: each end is a case of its own" in sheet
    assert "with low pressure" in sheet
    refused = " ".join(run("calculation", str(text), "L-3").stdout.split())
    assert "Cells that were refused" in refused
    assert "'<90000'" in refused
    assert "25 kg/s" in refused


def test_a_sheet_is_read_by_name_and_several_lists_are_asked_about(book: Path) -> None:
    asked = run("gate", str(book))
    assert asked.exit_code == 2
    assert "Rev B" in asked.stderr
    assert "Rev C" in asked.stderr
    for name, lines in (("Rev B", 1), ("Rev C", 2)):
        target = book.with_suffix(".json")
        result = run("gate", str(book), "--sheet", name, "--json", str(target))
        assert result.exit_code in (0, 1), result.stderr
        assert json.loads(target.read_text(encoding="utf-8"))["counts"]["lines"] == lines


def test_a_sheet_that_is_not_there_or_of_a_text_is_refused(book: Path, text: Path) -> None:
    for path in (book, text):
        result = run("gate", str(path), "--sheet", "Rev Z")
        assert result.exit_code == 2
        assert "Rev Z" in result.stderr


def test_ambient_of_the_criteria_reaches_the_cells(text: Path, tmp_path: Path) -> None:
    text.write_text(text.read_text(encoding="utf-8").replace(";25;", ";AMB;"), encoding="utf-8")
    criteria = tmp_path / "criteria.toml"
    site = '[site]\nambient_minimum = "-5 degC"\nambient_maximum = "32 degC"\n'
    criteria.write_text(f'[project]\nbased_on = "default"\n{site}', encoding="utf-8")
    sheet = run("calculation", str(text), "L-1", "--criteria", str(criteria)).stdout
    assert "high temperature" in sheet
    assert "305.15" in sheet
    without = " ".join(run("calculation", str(text), "L-1").stdout.split())
    assert "ambient range of the site, which the criteria do not state" in without


class RingsAtTheEnd:
    """A timer whose time has come when the work is done."""

    def __init__(self, after: float, call: Callable[[], object]) -> None:
        self.cancel = call

    def start(self) -> None:
        """Begin."""


def test_gate_says_what_it_does_when_it_takes_long(text: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr("checker.cli.SLOW_AFTER", 600.0)
    assert "reading and checking" not in run("gate", str(text)).stderr
    monkeypatch.setattr("checker.cli.threading.Timer", RingsAtTheEnd)
    assert "... reading and checking list.csv" in run("gate", str(text)).stderr
    assert "reading and checking" not in run("gate", str(text), "--quiet").stderr
