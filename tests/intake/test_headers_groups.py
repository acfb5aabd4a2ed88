"""Group names above and beneath the header row: joined where they are understood, else the column is asked about.

The layouts are those of printed line lists: common practice, from memory.
"""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest
from lists import read
from openpyxl import Workbook

from checker.criteria.hints import ColumnHint
from checker.errors import InputError
from checker.intake import read_line_list
from checker.intake.layout import find_layout
from checker.model import Gap, LineList

HEADER = "Line No,Size (NPS),Phase,P (barg),T (C),Flow (kg/h),Density (kg/m3),From"
ROW = "P-1,6,L,10,80,1000,980,V-1"


def reason(listed: LineList, header: str) -> str:
    return " ".join(item.reason for item in listed.unread if item.text == header)


def given(listed: LineList) -> set[str]:
    """Return the fields of which a value was read."""
    return {name for name, values in listed.numbers.items() if np.isfinite(values).any()}


def test_design_above_makes_design_values_of_what_it_stands_over(tmp_path: Path) -> None:
    listed = read(tmp_path, f",,,Design,,,,\n{HEADER}\n{ROW}\n")
    assert given(listed) == {"size", "pressure_design", "temperature_design"}
    assert listed.number("pressure_design")[0] == pytest.approx(1.1e6)
    for header in ("Flow (kg/h)", "Density (kg/m3)"):
        assert "'Design' in the row above: does it belong to it?" in reason(listed, header)
    assert listed.gap("flow_mass")[0] == Gap.REFUSED


def test_test_above_is_no_operating_pressure(tmp_path: Path) -> None:
    listed = read(tmp_path, ",,Test,\nLine No,Size (NPS),P (barg),Flow (kg/h)\nP-1,6,10,1000\n")
    assert given(listed) == {"size", "pressure_test"}


@pytest.mark.parametrize("group", ["Jacket", "Steam tracing", "Insulation", "Vacuum conditions", "MECHANICAL"])
def test_group_that_is_not_understood_leaves_its_columns_unread(tmp_path: Path, group: str) -> None:
    listed = read(tmp_path, f",,,{group},,,,\n{HEADER}\n{ROW}\n")
    assert given(listed) == {"size"}
    assert f"'{group}' stands above 'P (barg)'" in reason(listed, f"{group} P (barg)")
    assert "does it belong to it" in reason(listed, "T (C)")


def test_criteria_settle_a_column_beside_a_group(tmp_path: Path) -> None:
    columns = {"Flow (kg/h)": ColumnHint("flow_mass")}
    assert "flow_mass" in given(read(tmp_path, f",,,Design,,,,\n{HEADER}\n{ROW}\n", columns=columns))


def test_cell_with_a_unit_of_its_own_is_not_read_beside_a_group(tmp_path: Path) -> None:
    text = ",,Jacket,,\nLine No,rho (kg/m3),P,T,Size\nP-1,980,10 barg,80 C,DN 150\n"
    listed = read(tmp_path, text)
    assert given(listed) == {"density"}


def test_column_in_doubt_takes_nothing_from_a_certain_one(tmp_path: Path) -> None:
    text = ",Process,,,Mechanical,\nLine No,Flow (kg/h),P (barg),T (C),P (barg),T (C)\nP-1,1000,5,40,10,80\n"
    listed = read(tmp_path, text)
    assert listed.number("temperature")[0] == pytest.approx(313.15)
    assert listed.number("pressure")[0] == pytest.approx(6e5)
    assert "'Mechanical'" in reason(listed, "T (C)")


def test_second_pressure_beneath_a_group_is_asked(tmp_path: Path) -> None:
    text = ",Design,,,,\nLine No,P (barg),T (C),Press (barg),Temp (C),Size (NPS)\nP-1,10,80,5,40,6\n"
    listed = read(tmp_path, text)
    assert given(listed) == {"pressure_design", "temperature_design"}
    assert "does it belong to it" in reason(listed, "Press (barg)")


def test_group_ends_where_it_has_all_that_the_one_before_it_has(tmp_path: Path) -> None:
    header = "Line No,P (barg),T (C),P (barg),T (C),Density (kg/m3),Viscosity (cP)"
    listed = read(tmp_path, f",Operating,,Design,,,\n{header}\nP-1,5,40,10,80,980,1\n")
    assert listed.number("density")[0] == 980.0
    assert listed.number("viscosity")[0] == pytest.approx(1e-3)


@pytest.mark.parametrize(
    "title",
    [
        "Project: X,,,,,,,", "Project,Marrowquay,,,,,,", "MARROWQUAY TERMINAL,,,,,,,", ",,,LINE LIST,,,,",
        "Client,Marrowquay,,,Date,12.3.2020,,", ",,,,,,Rev 3,", "Design,,,,,,,\n,,,,,,,",
    ],
)  # fmt: skip
def test_title_block_changes_nothing(tmp_path: Path, title: str) -> None:
    listed = read(tmp_path, f"{title}\n{HEADER}\n{ROW}\n")
    assert given(listed) == {"size", "pressure", "temperature", "flow_mass", "density"}
    assert listed.unread == ()


def test_group_repeated_over_its_columns_does_not_spill() -> None:
    rows = [
        ["", "", "Design", "Design", "", "Insulation", ""],
        ["Line No", "Sch", "P (barg)", "T (C)", "Flow (kg/h)", "Type", "Density (kg/m3)"],
        ["P-1", "40", "10", "80", "1000", "H", "980"],
    ]
    layout = find_layout(rows, file="list.csv", hints={})
    assert layout.headers[2:] == (
        "Design P (barg)",
        "Design T (C)",
        "Flow (kg/h)",
        "Insulation Type",
        "Density (kg/m3)",
    )
    assert not layout.doubts


def test_blank_beside_a_single_group_is_asked_where_it_might_be_its_own() -> None:
    rows = [["", "Operating", "Operating", "Design", ""], ["Line No", "P (barg)", "Flow (kg/h)", "P (barg)", "T (C)"]]
    layout = find_layout([*rows, ["P-1", "5", "1000", "10", "80"]], file="list.csv", hints={})
    assert set(layout.doubts) == {4}


def test_merged_groups_in_the_first_row_do_not_spill() -> None:
    rows = [
        ["Line No", "Normal", "Normal", "Maximum", "Maximum", "", "Remarks"],
        ["", "Flow (kg/h)", "P (barg)", "Flow (kg/h)", "P (barg)", "Density (kg/m3)", ""],
        ["P-1", "1", "2", "3", "4", "5", ""],
    ]
    assert find_layout(rows, file="list.csv", hints={}).headers[5] == "Density (kg/m3)"


@pytest.mark.parametrize("symbols", [",,,P,T,P,T\n", ""])
@pytest.mark.parametrize("units", [",NPS,kg/h,barg,C,barg,C\n", ",NPS,kg/h,(barg),(C),(barg),(C)\n"])
def test_letters_and_units_beneath_groups(tmp_path: Path, symbols: str, units: str) -> None:
    text = f"Line No,Size,Flow,Operating,,Design,\n{symbols}{units}P-1,6,1000,5,40,10,80\n"
    listed = read(tmp_path, text)
    values = {name: listed.number(name)[0] for name in ("pressure", "temperature", "pressure_design")}
    assert values == pytest.approx({"pressure": 6e5, "temperature": 313.15, "pressure_design": 1.1e6})


def test_letters_beneath_groups_with_units_in_the_cells(tmp_path: Path) -> None:
    text = "Line No,Size (NPS),Operating,,Design,\n,,P,T,P,T\nP-1,6,5 barg,40 C,10 barg,80 C\n"
    assert read(tmp_path, text).number("temperature_design")[0] == pytest.approx(353.15)


def test_unit_of_another_quantity_beneath_a_group_is_asked(tmp_path: Path) -> None:
    text = "Line No,Size,Flow,Operating,\n,NPS,kg/h,barg,kg/m3\nP-1,6,1000,5,980\n"
    listed = read(tmp_path, text)
    assert given(listed) == {"size", "flow_mass", "pressure"}
    assert "'kg/m3' stands beneath 'Operating'" in reason(listed, "Operating (kg/m3)")


def test_words_wrapped_over_two_rows(tmp_path: Path) -> None:
    text = "Line,Nominal,Fluid,Mass,Oper.\nNumber,Size,Phase,Flow,Press.\n,(NPS),,(kg/h),(barg)\nP-1,6,L,1000,5\n"
    listed = read(tmp_path, text)
    assert listed.line_number == ("P-1",)
    assert given(listed) == {"size", "flow_mass", "pressure"}


def test_unfamiliar_texts_beneath_two_quantities_are_cases(tmp_path: Path) -> None:
    text = "Line No,Size (NPS),Flow (kg/h),,Press (barg),\n,,PG,BH,PG,BH\nP-1,6,3600,7200,5,6\n"
    listed = read(tmp_path, text)
    assert [listed.case.text(index) for index in range(2)] == ["pg", "bh"]
    assert listed.number("flow_mass").tolist() == pytest.approx([1.0, 2.0])
    assert listed.number("pressure").tolist() == pytest.approx([6e5, 7e5])


def test_unfamiliar_texts_beneath_one_quantity_are_asked(tmp_path: Path) -> None:
    text = "Line No,Size (NPS),Flow (kg/h),,Press (barg)\n,,W,Q,\nP-1,6,3600,7200,5\n"
    listed = read(tmp_path, text)
    assert given(listed) == {"size", "pressure"}
    assert "is it a case, or another quantity" in reason(listed, "Flow (kg/h) W")


def test_inlet_and_outlet_are_no_cases(tmp_path: Path) -> None:
    text = "Line No,Size (NPS),Pressure,,Temperature,\n,,Inlet (barg),Outlet (barg),Inlet (C),Outlet (C)\nP-1,6,5,4,40,39\n"
    listed = read(tmp_path, text)
    assert listed.case.texts == ("normal",)
    assert listed.number("pressure")[0] == pytest.approx(6e5)


@pytest.mark.parametrize("second", ["Value,Unit,Value,Unit", "In,Out,In,Out"])
def test_words_that_are_no_cases_are_asked(tmp_path: Path, second: str) -> None:
    text = f"Line No,Size (NPS),Flow,,Density,\n,,{second}\nP-1,6,5,kg/h,980,kg/m3\n"
    assert given(read(tmp_path, text)) == {"size"}


def test_numbers_without_a_header_between_columns_are_an_open_item(tmp_path: Path) -> None:
    listed = read(tmp_path, "Line No,Size (NPS),,Flow (kg/h)\nP-1,6,7,1000\n")
    assert "column 3 has no header and holds numbers" in reason(listed, "column 3")
    assert read(tmp_path, "Line No,Size (NPS),,Flow (kg/h)\nP-1,6,,1000\n").unread == ()


def test_legend_with_a_line_number_header_is_passed_over() -> None:
    real = ["Line No", "Size (NPS)", "Flow (kg/h)", "Press (barg)"]
    rows = [["Line No", "Service", "Unit", "Rev", "Notes"], [""], real, ["P-1", "6", "1000", "5"]]
    layout = find_layout(rows, file="list.csv", hints={})
    assert layout.header_row == 3
    assert any("Row 1 names a line number too" in note for note in layout.notes)


@pytest.mark.parametrize(
    ("header", "unit", "cell", "field"),
    [
        ("Flow (kg/h)", "t/h", "5", "flow_mass"), ("Press (barg)", "psig", "5", "pressure"),
        ("Press (barg)", "bara", "5", "pressure"), ("Temp (C)", "F", "5", "temperature"),
        ("Temp (C)", "F", "5 C", "temperature"), ("Size (NPS)", "DN", "6", "size"),
    ],
)  # fmt: skip
def test_header_and_units_row_that_differ_are_asked(
    tmp_path: Path, header: str, unit: str, cell: str, field: str
) -> None:
    listed = read(tmp_path, f"Line No,{header},rho (kg/m3)\n,{unit},kg/m3\nP-1,{cell},980\n")
    assert given(listed) == {"density"}
    assert "which one holds?" in reason(listed, header)
    assert listed.gap(field)[0] == Gap.REFUSED


@pytest.mark.parametrize(
    ("header", "unit"), [("Press (barg)", "bar(g)"), ("Press (bar)", "barg"), ("Press (barg)", "")]
)
def test_header_and_units_row_that_agree_are_read(tmp_path: Path, header: str, unit: str) -> None:
    listed = read(tmp_path, f"Line No,{header},rho (kg/m3)\n,{unit},kg/m3\nP-1,5,980\n")
    assert listed.number("pressure")[0] == pytest.approx(6e5)


def test_two_columns_for_one_field_name_the_unit_in_trouble(tmp_path: Path) -> None:
    with pytest.raises(InputError, match=r"two columns.*The unit of 'Press \(kg/cm3\)' is not read"):
        read(tmp_path, "Line No,Pressure (barg),Press (kg/cm3)\nP-1,5,6\n")


def test_single_merged_group_of_a_workbook_holds_for_its_range_only(tmp_path: Path) -> None:
    book = Workbook()
    sheet = book.active
    assert sheet is not None
    for row in (["", "", "", "Design"], HEADER.split(","), ["P-1", 6, "L", 10, 80, 1000, 980, "V-1"]):
        sheet.append(row)
    sheet.merge_cells("D1:E1")
    book.save(tmp_path / "list.xlsx")
    listed = read_line_list(tmp_path / "list.xlsx", units={}, columns={}, atmosphere=100_000.0)
    assert given(listed) == {"size", "pressure_design", "temperature_design", "flow_mass", "density"}
    assert listed.unread == ()


def test_two_rows_of_groups_above_the_headers(tmp_path: Path) -> None:
    header, row = "Line No,Size (NPS),P (barg),T (C),P (barg),T (C)", "P-1,6,5,40,10,80"
    listed = read(tmp_path, f",,Operating,,Jacket,\n,,Normal,,Design,\n{header}\n{row}\n")
    assert given(listed) == {"size", "pressure", "temperature"}
    assert "'Jacket' stands above" in reason(listed, "Jacket Design P (barg)")
