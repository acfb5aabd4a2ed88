"""`--drawing-lines`: what list and drawings do not agree on stands in every output and in the recommendation."""

from __future__ import annotations

import hashlib
import json
from pathlib import Path

import jsonschema
import pytest
from bs4 import BeautifulSoup
from click.testing import CliRunner, Result

import checker
from checker.cli import main
from checker.report.json_file import SCHEMA_FILE

HEADER = (
    "Line No.,Service,Phase,Size (NPS),Sch.,Flow [kg/h],Oper. Press. [barg],Oper. Temp. [degC],Density [kg/m3],"
    "Viscosity [cP],Length [m],Fittings,Elev. Change [m],Material"
)
ROW = "pump discharge,L,6,40,100000,4.0,25,997,0.89,50,none,0,carbon steel"
NUMBERS = ("6-P-1001-B1A", "6-P-1002-B1A", "6-P-1003-B1A", "6-P-2001-B1A")


def run(*arguments: str) -> Result:
    return CliRunner().invoke(main, list(arguments))


@pytest.fixture
def listed(tmp_path: Path) -> Path:
    path = tmp_path / "list.csv"
    path.write_text("\n".join([HEADER, *(f"{number},{ROW}" for number in NUMBERS)]) + "\n", encoding="utf-8")
    return path


def drawn(folder: Path, *numbers: str) -> Path:
    path = folder / "drawings.csv"
    rows = [f"{number},MQ-PID-{place}" for place, number in enumerate(numbers, start=1)]
    path.write_text("\n".join(["Line No,Drawing", *rows]) + "\n", encoding="utf-8")
    return path


def test_a_complete_list_adds_nothing_to_say(listed: Path, tmp_path: Path) -> None:
    plain = run("gate", str(listed))
    complete = run("gate", str(listed), "--drawing-lines", str(drawn(tmp_path, *NUMBERS)))
    assert (plain.exit_code, plain.stdout) == (complete.exit_code, complete.stdout)


def test_missing_lines_are_open_items_of_the_recommendation(listed: Path, tmp_path: Path) -> None:
    drawings = drawn(tmp_path, *NUMBERS[:3], "8-FG-7007-C1A")
    before, done = checker.review(listed), checker.review(listed, drawing_lines=drawings)
    assert before.completeness is None
    assert done.completeness is not None
    assert {kind: count for kind, count in done.completeness.counts.items() if count} == {
        "on the drawings, not in the list": 1,
        "in the list, not on the drawings": 1,
    }
    assert done.recommendation in ("comments", "revise and resubmit", "incomplete")
    assert "lines 'on the drawings, not in the list' 1" in " ".join(done.reasons)
    assert done.tally == before.tally
    digest = hashlib.sha256(drawings.read_bytes()).hexdigest()
    assert (drawings.name, digest) in [(source.name, source.sha256) for source in done.basis.inputs]


def test_every_output_names_the_missing_lines(listed: Path, tmp_path: Path) -> None:
    drawings = drawn(tmp_path, *NUMBERS[:3], "8-FG-<b>7007</b>-C1A")
    result = run("review", str(listed), "--drawing-lines", str(drawings), "--out", str(tmp_path / "out"), "--quiet")
    assert result.exit_code == 0
    assert "Completeness against the drawings" in result.stdout
    assert "7007" in result.stdout
    document = json.loads((tmp_path / "out" / "outcomes.json").read_text(encoding="utf-8"))
    jsonschema.validate(document, json.loads(SCHEMA_FILE.read_text(encoding="utf-8")))
    assert document["completeness"]["drawn"] == 4
    assert "6-P-2001-B1A" in [item["line_number"] for item in document["completeness"]["items"]]
    soup = BeautifulSoup((tmp_path / "out" / "exceptions.html").read_text(encoding="utf-8"), "html.parser")
    section = soup.select_one("#completeness")
    assert section is not None
    assert len(section.select(".completeness-table tbody tr")) == len(document["completeness"]["items"])
    assert "8-FG-<b>7007</b>-C1A" in section.get_text()


def test_without_drawings_nothing_is_said_of_them(listed: Path, tmp_path: Path) -> None:
    result = run("review", str(listed), "--out", str(tmp_path / "out"), "--quiet")
    assert "Completeness" not in result.stdout
    document = json.loads((tmp_path / "out" / "outcomes.json").read_text(encoding="utf-8"))
    assert document["completeness"] is None
    assert 'id="completeness"' not in (tmp_path / "out" / "exceptions.html").read_text(encoding="utf-8")


def test_the_drawings_file_is_an_input_that_is_never_written_over(listed: Path, tmp_path: Path) -> None:
    drawings = drawn(tmp_path, *NUMBERS)
    result = run("gate", str(listed), "--drawing-lines", str(drawings), "--json", str(drawings))
    assert result.exit_code == 2
    assert "never touched" in result.stderr
    missing = run("gate", str(listed), "--drawing-lines", str(tmp_path / "nowhere.csv"))
    assert missing.exit_code == 2
    assert "nowhere.csv" in missing.stderr
