"""`linelist template`: what it writes reads back, every header matched, in both forms alike; `linelist fields`."""

from __future__ import annotations

import csv
import io
import zipfile
from pathlib import Path

import numpy as np
import openpyxl
import pytest
from click.testing import CliRunner, Result

from checker.cli import main
from checker.criteria.classes import load_classes
from checker.criteria.load import load_criteria
from checker.fields import Field, all_fields
from checker.intake import read_line_list
from checker.intake.equipment import read_equipment
from checker.intake.headers import read_header
from checker.report.blank_workbook import HELP_SHEET, LIST_SHEET, blank_workbook
from checker.report.field_texts import all_units, example_header, example_of, header_of
from checker.report.templates_out import blank_fields
from checker.units import read_unit

NAMES = ["classes.csv", "criteria.toml", "deviations.csv", "equipment.csv", "line_list.csv", "line_list.xlsx"]
FIELDS = blank_fields()


def run(*arguments: str) -> Result:
    return CliRunner().invoke(main, list(arguments))


@pytest.fixture(scope="module")
def folder(tmp_path_factory: pytest.TempPathFactory) -> Path:
    place = tmp_path_factory.mktemp("template")
    assert run("template", str(place)).exit_code == 0
    return place


@pytest.fixture(scope="module")
def filled_workbook(folder: Path, tmp_path_factory: pytest.TempPathFactory) -> Path:
    book = openpyxl.load_workbook(folder / "line_list.xlsx")
    for column, field in enumerate(FIELDS, start=1):
        text = example_of(field)
        book[LIST_SHEET].cell(2, column).value = float(text) if field.kind == "number" else text
    path = tmp_path_factory.mktemp("filled") / "filled.xlsx"
    book.save(path)
    return path


@pytest.fixture(scope="module")
def filled_text(folder: Path, tmp_path_factory: pytest.TempPathFactory) -> Path:
    row = io.StringIO()
    csv.writer(row).writerow(map(example_of, FIELDS))
    path = tmp_path_factory.mktemp("filled") / "filled.csv"
    path.write_text((folder / "line_list.csv").read_text(encoding="utf-8") + row.getvalue(), encoding="utf-8")
    return path


def test_the_same_call_writes_the_same_bytes(folder: Path, tmp_path: Path) -> None:
    assert sorted(path.name for path in folder.iterdir()) == NAMES
    run("template", str(tmp_path))
    assert {path.name: path.read_bytes() for path in folder.iterdir()} == {
        path.name: path.read_bytes() for path in tmp_path.iterdir()
    }


def test_a_filled_row_reads_back_with_every_header_matched(filled_text: Path, filled_workbook: Path) -> None:
    text, book = read_line_list(filled_text), read_line_list(filled_workbook)
    for found in (text, book):
        assert [column.field for column in found.columns] == [field.name for field in FIELDS]
        assert not found.unmatched
        assert not found.unread
    assert set(text.numbers) == set(book.numbers)
    for name, values in text.numbers.items():
        assert np.isfinite(values).all(), name
        np.testing.assert_array_equal(values, book.numbers[name])
    for name in text.texts:
        assert text.text(name).text(0) == book.text(name).text(0), name


def test_both_forms_give_the_same_outcomes(folder: Path, filled_text: Path, filled_workbook: Path) -> None:
    given = ["--criteria", str(folder / "criteria.toml"), "--classes", str(folder / "classes.csv")]
    given += ["--deviations", str(folder / "deviations.csv")]
    first, second = run("gate", str(filled_text), *given), run("gate", str(filled_workbook), *given)
    assert (first.exit_code, first.stdout.splitlines()[:2]) == (second.exit_code, second.stdout.splitlines()[:2])
    assert first.exit_code in (0, 1)


def test_the_other_files_load(folder: Path) -> None:
    criteria = load_criteria(folder / "criteria.toml")
    assert load_classes(folder / "classes.csv", units=criteria.units).source.name == "classes.csv"
    equipment = read_equipment(folder / "equipment.csv", atmosphere=criteria.atmosphere)
    assert equipment.kind == ("vessel", "pump")
    assert not equipment.unread
    assert not equipment.unmatched


def test_an_equipment_list_is_not_taken_as_used(folder: Path) -> None:
    import checker
    from checker.errors import InputError

    with pytest.raises(InputError, match="equipment"):
        checker.review(folder / "line_list.csv", equipment=folder / "equipment.csv")


def test_the_workbook_has_drop_downs_notes_and_texts_for_sizes(folder: Path) -> None:
    book = openpyxl.load_workbook(folder / "line_list.xlsx")
    sheet = book[LIST_SHEET]
    places = {field.name: column for column, field in enumerate(FIELDS, start=1)}
    ranges = [str(each.sqref) for each in sheet.data_validations.dataValidation]
    for name in ("phase", "pressure_basis", "case", "schedule", "size"):
        letter = openpyxl.utils.get_column_letter(places[name])
        assert any(text.startswith(f"{letter}2:") for text in ranges), name
    assert all(sheet.cell(1, column).comment for column in places.values())
    assert sheet.freeze_panes == "B2"
    widths = [each for each in sheet.column_dimensions.values() if each.min <= places["size"] <= each.max]
    assert [each.number_format for each in widths] == ["@"]
    helped = {row[0] for row in book[HELP_SHEET].iter_rows(values_only=True)}
    assert {header_of(field) for field in FIELDS} <= helped


def test_the_workbook_holds_no_formula_link_or_macro() -> None:
    with zipfile.ZipFile(io.BytesIO(blank_workbook(FIELDS))) as parts:
        names = parts.namelist()
        sheets = [parts.read(name) for name in names if name.startswith("xl/worksheets/sheet")]
    assert not [name for name in names if "external" in name.lower() or "vbaProject" in name]
    assert not [content for content in sheets if b"<f>" in content or b"<f " in content]


@pytest.mark.parametrize("field", all_fields(), ids=lambda field: field.name)
def test_every_heading_shown_is_understood_as_its_field(field: Field) -> None:
    for header in (header_of(field), example_header(field)):
        reading = read_header(header)
        assert reading is not None, header
        assert field in reading.fields, header
    assert field.name in run("fields").stdout


def test_every_unit_shown_of_a_field_is_read() -> None:
    dimensions = {field.dimension for field in all_fields() if field.kind == "number"}
    for dimension in dimensions:
        assert all_units(dimension)
        for spellings in all_units(dimension):
            assert read_unit(spellings[0], dimension).dimension == dimension


def test_one_field_is_shown_in_full_and_an_unknown_one_names_the_closest() -> None:
    text = run("fields", "pressure").stdout
    assert all(word in text for word in ("barg", "bara", "ATM", "operating pressure", "example header"))
    unknown = run("fields", "presure")
    assert unknown.exit_code == 2
    assert "pressure" in unknown.stderr
