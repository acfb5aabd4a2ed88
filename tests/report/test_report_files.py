"""The files of a report: written whole or not at all, the PDF, the JSON, the CSV."""

from __future__ import annotations

import builtins
import csv
import io
import json
import re
import socket
from pathlib import Path
from typing import Any, NoReturn

import jsonschema
import numpy as np
import pytest
from fake_review import HOSTILE, make_review
from pypdf import PdfReader

from checker.errors import InputError
from checker.report import write
from checker.report.atomic import write_files, write_text
from checker.report.csv_file import hydraulics_csv
from checker.report.json_file import SCHEMA_FILE, outcomes_json
from checker.report.pdf import PANGO_SENTENCE, RefusingFetcher, render_pdf
from checker.report.write import write_report

FILES = {"exceptions.html", "exceptions.pdf", "outcomes.json", "hydraulics.csv"}


def quiet(_: str) -> None:
    """Say nothing."""


def small(**changes: Any) -> Any:
    """Return a small review."""
    return make_review(lines=5, exceptions=4, points=30, **changes)


def refuse_weasyprint(monkeypatch: pytest.MonkeyPatch, error: Exception) -> None:
    """Let the import of the PDF library fail as it does where its system part is missing."""
    real = builtins.__import__

    def failing(name: str, *arguments: Any, **keywords: Any) -> Any:
        if name == "weasyprint":
            raise error
        return real(name, *arguments, **keywords)

    monkeypatch.setattr(builtins, "__import__", failing)


def test_all_four_files_are_written_and_nothing_else(tmp_path: Path) -> None:
    steps: list[str] = []
    files = write_report(small(), tmp_path / "review", progress=steps.append)
    assert {path.name for path in files.paths} == FILES == {path.name for path in (tmp_path / "review").iterdir()}
    assert files.pdf_problem == ""
    assert steps[-2].endswith(": 4 not met in 4 exceptions, 5 lines, 10 line cases")
    assert re.fullmatch(r"preparing exceptions\.pdf: about \d+ pages worth", steps[-1])


@pytest.mark.parametrize("hostile", [False, True])
def test_pdf_is_made_with_the_network_refused(monkeypatch: pytest.MonkeyPatch, *, hostile: bool) -> None:
    def refused(*_: Any, **__: Any) -> NoReturn:
        raise AssertionError("the network was asked for")

    monkeypatch.setattr(socket.socket, "connect", refused)
    monkeypatch.setattr(socket, "getaddrinfo", refused)
    reader = PdfReader(io.BytesIO(render_pdf(small(hostile=hostile))))
    texts = [" ".join(page.extract_text().split()) for page in reader.pages]
    assert "Revise and resubmit" in texts[0]
    assert f"page 1 of {len(texts)}" in texts[0]
    assert all("Marrowquay terminal" in text and "Revise and resubmit" in text for text in texts)
    assert not any("/URI" in str(note.get_object()) for page in reader.pages for note in page.get("/Annots", []))


def test_pdf_has_bookmarks_of_the_sections_and_lines() -> None:
    reader = PdfReader(io.BytesIO(render_pdf(small())))
    titles = [entry.title for entry in reader.outline if not isinstance(entry, list)]
    assert titles[0].endswith("Recommendation and coverage")
    assert titles[-1].endswith("Results of every line")
    assert any(isinstance(entry, list) for entry in reader.outline)


@pytest.mark.parametrize("address", ["http://example.invalid/a.png", "file:///etc/hostname", "data:text/plain,a"])
def test_renderer_fetches_nothing(address: str) -> None:
    with pytest.raises(ValueError, match="the report fetches nothing"):
        RefusingFetcher()(address)


@pytest.mark.parametrize("error", [OSError("cannot load library 'libpango-1.0-0'"), ImportError("no weasyprint")])
def test_without_pango_the_rest_is_written_and_one_sentence_says_what_to_install(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch, error: Exception
) -> None:
    refuse_weasyprint(monkeypatch, error)
    files = write_report(small(), tmp_path, progress=quiet)
    assert {path.name for path in tmp_path.iterdir()} == FILES - {"exceptions.pdf"}
    assert files.pdf_problem == PANGO_SENTENCE
    assert "Results of every line" in (tmp_path / "exceptions.html").read_text(encoding="utf-8")


def test_without_pango_an_older_pdf_does_not_stay_beside_the_new_page(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    (tmp_path / "exceptions.pdf").write_bytes(b"of an earlier run")
    refuse_weasyprint(monkeypatch, OSError("no Pango"))
    files = write_report(small(), tmp_path, progress=quiet)
    assert not (tmp_path / "exceptions.pdf").exists()
    assert "of an earlier run was removed" in files.pdf_problem


def test_nothing_is_written_when_an_output_cannot_be_made(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    (tmp_path / "exceptions.html").write_text("earlier", encoding="utf-8")

    def failing(*_: Any, **__: Any) -> NoReturn:
        raise RuntimeError("in the middle of the page")

    monkeypatch.setattr(write, "render_pdf", failing)
    with pytest.raises(RuntimeError, match="in the middle of the page"):
        write_report(small(), tmp_path, progress=quiet)
    assert [path.name for path in tmp_path.iterdir()] == ["exceptions.html"]
    assert (tmp_path / "exceptions.html").read_text(encoding="utf-8") == "earlier"


def test_no_part_of_a_file_stays_when_the_writing_itself_fails(tmp_path: Path) -> None:
    contents: dict[str, Any] = {"first.txt": b"whole", "second.txt": "not bytes"}
    with pytest.raises(TypeError):
        write_files(tmp_path, contents)
    assert list(tmp_path.iterdir()) == []


def test_a_folder_that_cannot_be_made_gives_a_sentence(tmp_path: Path) -> None:
    (tmp_path / "review").write_text("a file, no folder", encoding="utf-8")
    with pytest.raises(InputError, match=r"review: the output cannot be written here .* name another place"):
        write_report(small(), tmp_path / "review", progress=quiet)
    assert [path.name for path in tmp_path.iterdir()] == ["review"]


def test_text_is_written_whole(tmp_path: Path) -> None:
    write_text(tmp_path / "list.csv", "a\udc80")
    assert (tmp_path / "list.csv").read_bytes() == b"a\\udc80"


@pytest.mark.parametrize("hostile", [False, True])
def test_json_is_valid_against_the_schema_shipped(*, hostile: bool) -> None:
    schema = json.loads(SCHEMA_FILE.read_text(encoding="utf-8"))
    jsonschema.Draft202012Validator.check_schema(schema)
    record = json.loads(outcomes_json(small(hostile=hostile)), parse_constant=_no_constant)
    jsonschema.Draft202012Validator(schema).validate(record)


def test_json_holds_what_is_not_met_and_not_checked() -> None:
    review = small()
    record = json.loads(outcomes_json(review))
    assert [outcome["outcome"] for outcome in record["outcomes"]] == [
        *["does not meet"] * 4,
        "approved deviation",
        "not checked",
    ]
    assert record["outcomes"][0]["utilisation"] == "infinite"
    assert record["outcomes"][-1]["value"] is None
    assert record["outcomes"][1]["value"] == pytest.approx(3.17)
    assert record["tally"] == dict(review.tally)
    assert [entry["sha256"] for entry in record["inputs"]] == [source.sha256 for source in review.basis.inputs]
    assert json.loads(outcomes_json(small(coverage=float("nan"))))["coverage"]["checked"] is None


def _no_constant(name: str) -> NoReturn:
    raise AssertionError(f"{name} is no JSON")


def test_csv_has_one_row_a_line_case_and_the_unit_in_each_header() -> None:
    review = small()
    rows = list(csv.reader(io.StringIO(hydraulics_csv(review))))
    assert rows[0] == ["line_number", "case", "velocity [m/s]", "dp_total [Pa]", "reynolds", "flow_regime"]
    assert len(rows) == 1 + review.line_cases
    assert rows[1][2] == ""
    assert float(rows[2][2]) == pytest.approx(review.hydraulics_columns()[0][2][1], rel=1e-9)


def test_csv_lets_no_formula_through() -> None:
    rows = list(csv.reader(io.StringIO(hydraulics_csv(small()))))
    assert {row[5] for row in rows[1:]} == {"segregated", "'=evil()"}


def test_csv_keeps_negative_and_infinite_numbers_as_numbers(monkeypatch: pytest.MonkeyPatch) -> None:
    review = small()
    numbers = np.array([-1.5, np.inf, np.nan, 0.0, 1e-12, 2.0, 3.0, 4.0, 5.0, 6.0])
    monkeypatch.setattr(review, "hydraulics_columns", lambda: [("dp_elevation", "Pa", numbers)])
    rows = list(csv.reader(io.StringIO(hydraulics_csv(review))))
    assert [row[2] for row in rows[1:6]] == ["-1.5", "inf", "", "0", "1e-12"]


def test_csv_of_hostile_line_numbers_keeps_its_shape() -> None:
    review = make_review(lines=len(HOSTILE), exceptions=1, points=5, hostile=True)
    rows = list(csv.reader(io.StringIO(hydraulics_csv(review))))
    assert {len(row) for row in rows} == {6}
    assert len(rows) == 1 + review.line_cases
