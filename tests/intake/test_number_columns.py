"""Number columns as a whole: decimal marks by evidence, ranges carried to line cases, notes, and the record of a cell."""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest
from lists import SITE_ATMOSPHERE, one_column, read, write

from checker.intake import read_line_list
from checker.model import Gap


def test_the_decimal_mark_is_always_said(tmp_path: Path) -> None:
    assert "Decimal points." in read(tmp_path, one_column("Temp [K]", "300.5", "310")).notes
    assert "Decimal commas." in read(tmp_path, one_column("Temp [K]", "300,5", "310", delimiter=";")).notes
    assert "Decimal commas." in read(tmp_path, one_column("Temp [K]", "300,5", "310", delimiter=";")).source.form


def test_quoted_decimal_commas_in_a_list_of_commas_are_read_by_their_evidence(tmp_path: Path) -> None:
    listed = read(tmp_path, one_column("Temp [K]", "0,5", "300,25", "1,234", "310"))
    assert listed.number("temperature").tolist() == [0.5, 300.25, 1.234, 310.0]
    assert any("a comma is the decimal mark, as '0,5' shows." in note for note in listed.notes)
    assert "Decimal commas." in listed.notes
    mixed = 'Line No,Temp [K],rho [kg/m3]\nP-1,"0,5",998.2\nP-2,"300,25",998.25\n'
    assert "Decimal points and decimal commas, by column." in read(tmp_path, mixed).notes


def test_thousands_are_read_by_their_evidence(tmp_path: Path) -> None:
    listed = read(tmp_path, one_column("Flow [kg/h]", "1,234,567", "1,234", "12.5", "1,234.5"))
    assert (listed.number("flow_mass") * 3600).tolist() == pytest.approx([1234567.0, 1234.0, 12.5, 1234.5], rel=1e-14)


@pytest.mark.parametrize("cells", [("1,234", "5,678"), ("1,234", "300")])
def test_without_evidence_both_readings_are_shown(tmp_path: Path, cells: tuple[str, ...]) -> None:
    listed = read(tmp_path, one_column("Temp [K]", *cells))
    assert listed.gap("temperature")[0] == Gap.REFUSED
    assert "reads as 1.234 or as 1234" in listed.refusals["temperature", 0]


def test_points_in_a_column_of_decimal_commas_are_not_taken_as_decimals(tmp_path: Path) -> None:
    listed = read(tmp_path, one_column("Flow [kg/h]", "12.345", "1.234,5", "12,5", delimiter=";"))
    assert (listed.number("flow_mass") * 3600).tolist() == pytest.approx([12345.0, 1234.5, 12.5], rel=1e-14)


def test_both_ends_of_a_kinematic_viscosity_take_the_density(tmp_path: Path) -> None:
    listed = read(tmp_path, "Line No,Viscosity [cSt],Density [kg/m3]\nP-1,2-5,900\nP-2,2-5,\nP-3,4,800\n")
    cases = {(listed.line_number[line], listed.case.text(i)): i for i, line in enumerate(listed.line.tolist())}
    values = listed.number("viscosity")
    assert values[cases["P-1", "normal, with low viscosity"]] == pytest.approx(2e-6 * 900)
    assert values[cases["P-1", "normal, with high viscosity"]] == pytest.approx(5e-6 * 900)
    assert values[cases["P-3", "normal"]] == pytest.approx(4e-6 * 800)
    assert np.isnan(values[cases["P-2", "normal"]])
    assert "needs the density" in listed.refusals["viscosity", cases["P-2", "normal"]]
    assert [(item.line_number, item.text) for item in listed.ranges] == [("P-1", "2-5")]


def test_a_flow_from_zero_up_is_a_flow(tmp_path: Path) -> None:
    listed = read(tmp_path, "Line No,Flow [kg/h],Temp [K]\nP-1,0-3600,300\nP-2,0,300\n")
    flows = {
        listed.case.text(index): value
        for index, value in enumerate(listed.number("flow_mass"))
        if listed.line[index] == 0
    }
    assert flows == {"normal, with low flow mass": 0.0, "normal, with high flow mass": 1.0}


@pytest.mark.parametrize("cell", ["-300 to 20", "5 to 1e9"])
def test_a_range_with_an_impossible_end_is_refused_whole(tmp_path: Path, cell: str) -> None:
    listed = read(tmp_path, one_column("Temp [degC]", "20", cell))
    assert listed.gap("temperature").tolist() == [Gap.GIVEN, Gap.REFUSED]
    assert not listed.ranges


def test_ambient_is_the_sites_range(tmp_path: Path) -> None:
    path = write(tmp_path, one_column("Temp [degC]", "AMB", "20"))
    listed = read_line_list(path, atmosphere=SITE_ATMOSPHERE, ambient=(263.15, 318.15))
    assert listed.number("temperature").tolist() == [263.15, 318.15, 293.15]
    assert "which the criteria do not state" in read(tmp_path, path.read_text()).refusals["temperature", 0]


def test_a_row_whose_cells_may_have_moved_has_no_range(tmp_path: Path) -> None:
    listed = read(tmp_path, "Line No,Temp [K]\nP-1,300-310,x\nP-2,300\n")
    assert listed.gap("temperature").tolist() == [Gap.REFUSED, Gap.GIVEN]
    assert not listed.ranges


def test_footnote_marks_are_said_with_their_rows(tmp_path: Path) -> None:
    listed = read(tmp_path, one_column("Temp [K]", "300*", "310", "320 (Note 2)"))
    assert listed.number("temperature").tolist() == [300.0, 310.0, 320.0]
    note = next(note for note in listed.notes if "footnote mark" in note)
    assert note.startswith("Column 'Temp [K]': numbers read without what stands behind them")
    assert note.endswith("rows 2, 4.")


def test_the_record_of_a_cell_keeps_text_number_unit_and_si_value(tmp_path: Path) -> None:
    listed = read(tmp_path, one_column("Press [barg]", "5", "<7", "80 psig"))
    plain, limit, own = (listed.record("pressure", index) for index in range(3))
    assert plain is not None
    assert limit is not None
    assert own is not None
    assert (plain.text, plain.numbers, plain.unit, plain.values) == ("5", (5.0,), "barg", (600_000.0,))
    assert (limit.numbers, limit.values) == ((7.0,), (800_000.0,))
    assert listed.gap("pressure")[1] == Gap.REFUSED
    assert own.unit == "psig"
    assert own.values[0] == listed.number("pressure")[2]
    assert listed.record("remarks", 0) is None


def test_a_stand_in_is_refused_on_the_fast_path_too(tmp_path: Path) -> None:
    listed = read(tmp_path, one_column("Temp [K]", "9999", "300"))
    assert listed.gap("temperature").tolist() == [Gap.REFUSED, Gap.GIVEN]
    assert "stand-in for an unknown value" in listed.refusals["temperature", 0]
