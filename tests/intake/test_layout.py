"""Header rows: one, two or three, groups above or beneath, symbols, units, numberings; what every header became."""

from __future__ import annotations

from pathlib import Path

import pytest
from lists import read

from checker.errors import InputError
from checker.intake.layout import find_layout

# Layouts of printed line lists: common practice.
LAYOUTS = [
    (
        [["", "", "Operating", "", "Design", ""], ["Line No", "Size", "Press", "Temp", "Press", "Temp"]],
        ["Line No", "Size", "Operating Press", "Operating Temp", "Design Press", "Design Temp"],
        3,
    ),
    (
        [["Line No", "Size", "Operating", "", "Design", ""], ["", "", "Press", "Temp", "Press", "Temp"]],
        ["Line No", "Size", "Operating Press", "Operating Temp", "Design Press", "Design Temp"],
        3,
    ),
    (
        # Merged cells come repeated over their columns and rows.
        [["Line No", "Operating", "Operating", "Remarks"], ["Line No", "Press", "Temp", "Remarks"]],
        ["Line No", "Operating Press", "Operating Temp", "Remarks"],
        3,
    ),
    (
        [["Line No", "Press.", "", "Temp.", ""], ["", "Oper", "Design", "Oper", "Design"]],
        ["Line No", "Press. Oper", "Press. Design", "Temp. Oper", "Temp. Design"],
        3,
    ),
    (
        [["", "", "Design", ""], ["Line No", "Size", "Press", "Temp"]],
        ["Line No", "Size", "Design Press", "Design Temp"],
        3,
    ),
    (
        # A group that may change what is meant stays in the header, which then matches nothing.
        [["Line No", "Upstream", "", "Remarks"], ["", "Press", "Temp", ""]],
        ["Line No", "Upstream Press", "Upstream Temp", "Remarks"],
        3,
    ),
    (
        [["Line No", "Mass flow", "Operating pressure"], ["-", "W", "p"], ["-", "kg/s", "bara"], ["(1)", "(2)", "(3)"]],
        ["Line No", "Mass flow", "Operating pressure"],
        5,
    ),
    (
        # Three rows, none of which repeats a merged name.
        [
            ["Line No", "Size", "Process conditions", "", "", "", "Mechanical", ""],
            ["", "", "Normal", "", "Maximum", "", "Design", ""],
            ["", "", "Press", "Temp", "Press", "Temp", "Press", "Temp"],
        ],
        [
            "Line No",
            "Size",
            "Normal Press",
            "Normal Temp",
            "Maximum Press",
            "Maximum Temp",
            "Mechanical Design Press",
            "Mechanical Design Temp",
        ],
        4,
    ),
    (
        [["Line No", "Size", "Minimum", "Normal"], ["", "", "Temp", "Temp"], ["A", "B", "C", "D"]],
        ["Line No", "Size", "Minimum Temp", "Normal Temp"],
        4,
    ),
    ([["", "", ""], ["", "Line No", "Size"]], ["", "Line No", "Size"], 3),
    ([["Project", "X"], ["Line No", "Size (NPS)", "Flow (kg/h)"]], ["Line No", "Size (NPS)", "Flow (kg/h)"], 3),
]


@pytest.mark.parametrize(("rows", "headers", "first_row"), LAYOUTS)
def test_header_rows_are_read_together(rows: list[list[str]], headers: list[str], first_row: int) -> None:
    layout = find_layout([*rows, ["P-1", "6", "5", "20", "10", "60"]], file="list.csv", hints={})
    assert list(layout.headers) == headers
    assert layout.first_row == first_row


def test_units_row_must_fit_the_headers() -> None:
    rows = [
        ["Line No", "Mass flow", "Operating pressure"],
        ["", "W", "p"],
        ["", "[kg/s]", "[bar a]"],
        ["P-1", "1", "2"],
    ]
    layout = find_layout(rows, file="list.csv", hints={})
    assert layout.units == ("", "kg/s", "bar a")


def test_transposed_table_is_refused_with_what_to_do() -> None:
    rows = [["Line No", "P-1", "P-2"], ["Size (NPS)", "6", "4"], ["Flow (kg/h)", "1", "2"], ["Temp (C)", "20", "30"]]
    with pytest.raises(InputError, match=r"transposed.*Turn it"):
        find_layout(rows, file="list.csv", hints={})


def test_transposed_table_without_a_line_number_is_refused_as_transposed() -> None:
    rows = [["Stream", "S1", "S2"], ["Size (NPS)", "6", "8"], ["Flow (kg/h)", "1", "2"], ["Temp (C)", "1", "2"]]
    with pytest.raises(InputError, match=r"transposed: 4 headers stand in column 1.*Turn it"):
        find_layout(rows, file="list.csv", hints={})


def test_line_number_column_without_a_header_is_named() -> None:
    with pytest.raises(InputError, match=r"no line-number column.*column 1, without a header, if it holds the numbers"):
        find_layout([["", "Size", "Press (barg)", "Temp (C)"], ["P-1", "6", "5", "20"]], file="list.csv", hints={})


def test_headers_are_looked_for_in_the_first_forty_rows() -> None:
    header = ["Line No", "Size", "Press (barg)"]
    assert find_layout([["x"]] * 39 + [header], file="list.csv", hints={}).header_row == 40
    with pytest.raises(InputError, match="none of the first 40 rows"):
        find_layout([["x"]] * 40 + [header], file="list.csv", hints={})


def test_every_header_is_accounted_for(tmp_path: Path) -> None:
    text = (
        "Line No,Size,Flow norm,Oper Press (barg),Colour,Opr. Temprature (C),Remarks\n"
        ",NPS,kg/h,,,,\n"
        "P-1,6,50000,4,red,20,\n"
    )
    listed = read(tmp_path, text)
    assert [(m.position, m.header, m.field, m.case, m.unit) for m in listed.matching] == [
        (1, "Line No", "line_number", "", ""),
        (2, "Size", "size", "", "NPS"),
        (3, "Flow norm", "flow_mass", "normal", "kg/h"),
        (4, "Oper Press (barg)", "pressure", "", "barg"),
        (5, "Colour", "", "", ""),
        (6, "Opr. Temprature (C)", "", "", ""),
        (7, "Remarks", "remarks", "", ""),
    ]
    assert listed.matching[2].remark == "unit from the units row"
    assert "closest field is temperature" in listed.matching[5].remark
    assert [item.text for item in listed.unread] == ["Opr. Temprature (C)"]


def test_header_of_two_quantities_is_asked(tmp_path: Path) -> None:
    listed = read(tmp_path, "Line No,Size (NPS),Flow,Oper Temp (C)\nP-1,6,500,20\n")
    sentence = next(item.reason for item in listed.unread if item.text == "Flow")
    for words in ("no unit", "mass flow", "volume flow", "name its field in [columns]"):
        assert words in sentence


def test_service_and_fluid_code_side_by_side(tmp_path: Path) -> None:
    listed = read(tmp_path, "Line No,Fluid code,Service,Size (NPS),Flow (kg/h)\nP-1,CW,Cooling water,6,500\n")
    assert listed.text("service").text(0) == "Cooling water"
    assert ["names the service too" in item.reason for item in listed.unread] == [True]


# What an unmerged group reaches over is seen only where its headers repeat those of the group before it.
REACH = [
    (
        ["Line No", "NPS", "Normal", "", "Minimum", "", "", ""],
        [
            "",
            "",
            "Flow (kg/h)",
            "Op Press (barg)",
            "Flow (kg/h)",
            "Op Press (barg)",
            "Design Press (barg)",
            "Density (kg/m3)",
        ],
        {6, 7},
    ),
    (
        ["Line No", "NPS", "Normal", "Max", "", ""],
        ["", "", "Flow (kg/h)", "Flow (kg/h)", "Op Press (barg)", "From"],
        {4},
    ),
    (
        ["Line No", "NPS", "Operating", "", "Design", "", "", ""],
        ["", "", "P (barg)", "T (C)", "P (barg)", "T (C)", "Flow (kg/h)", "Length (m)"],
        {6},
    ),
]


@pytest.mark.parametrize(("upper", "lower", "asked"), REACH)
def test_a_group_does_not_reach_beyond_what_repeats(upper: list[str], lower: list[str], asked: set[int]) -> None:
    layout = find_layout([upper, lower, ["P-1", "6", "1", "2", "3", "4", "5", "6"]], file="list.csv", hints={})
    assert set(layout.doubts) == asked
    assert list(layout.headers[6:]) == lower[6:]


def test_min_beneath_a_group_is_no_minute() -> None:
    rows = [
        ["Line No", "NPS", "Operating", "", "", ""],
        ["", "", "Normal", "", "Min", ""],
        ["", "", "Press (barg)", "Temp (C)", "Press (barg)", "Temp (C)"],
    ]
    layout = find_layout([*rows, ["P-1", "6", "5", "25", "4", "20"]], file="list.csv", hints={})
    assert layout.first_row == 4
    assert "Min" in layout.headers[4]


def test_a_case_row_ends_where_the_group_above_it_does(tmp_path: Path) -> None:
    text = (
        "Line No,NPS,Operating,,,,Design,\n,,Normal,,Min,,,\n"
        ",,Press (barg),Temp (C),Press (barg),Temp (C),Press (barg),Temp (C)\nP-1,6,5,25,4,20,10,60\n"
    )
    listed = read(tmp_path, text)
    assert listed.number("pressure_design")[0] == pytest.approx(1_100_000.0)
    assert listed.number("temperature_design")[0] == pytest.approx(333.15)
    assert not listed.has("pressure_design_minimum")


def test_symbols_beneath_headers_of_their_own_are_left_out() -> None:
    rows = [
        ["Line number", "Density", "Pressure", "Outside diameter", "Wall thickness", "Length", ""],
        ["", "", "P1", "Dext", "T", "L", "Tclose"],
        ["", "kg/m3", "bara", "mm", "mm", "m", "s"],
    ]
    layout = find_layout([*rows, ["P-1", "850", "5", "762", "16", "2400", "7.5"]], file="list.csv", hints={})
    assert list(layout.headers[:6]) == rows[0][:6]
    assert layout.first_row == 4
