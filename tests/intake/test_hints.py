"""What the criteria's ``[columns]`` say of headers."""

from __future__ import annotations

from pathlib import Path

import pytest
from lists import read

from checker.criteria.hints import ColumnHint
from checker.errors import InputError


def test_unit_of_hint_wins_over_the_criteria(tmp_path: Path) -> None:
    hint = {"q1": ColumnHint("flow_volume", unit="l/min")}
    listed = read(tmp_path, "Line No,Q1,T [K]\nP-1,7.2,1\n", units={"volume flow": "m3/s"}, columns=hint)
    assert listed.number("flow_volume")[0] == pytest.approx(7.2e-3 / 60, rel=1e-14)


@pytest.mark.parametrize(
    ("header", "row_unit", "hint"),
    [
        ("Q1 (m3/h)", "", ColumnHint("flow_volume", unit="l/min")),
        ("Q1 (m3/h)", "", ColumnHint("flow_mass", unit="kg/h")),
        ("Q1", "l/s", ColumnHint("flow_volume", unit="l/min")),
        ("P1 [barg]", "", ColumnHint("pressure", unit="bara")),
        ("P1 [bar]", "", ColumnHint("pressure", unit="psig")),
        ("T1 °F", "", ColumnHint("temperature", unit="degC")),
        ("SG", "", ColumnHint("density", unit="kg/m3")),
        ("Bore (DN)", "", ColumnHint("size", unit="NPS")),
    ],
)
def test_unit_of_hint_against_the_unit_of_the_list(
    tmp_path: Path, header: str, row_unit: str, hint: ColumnHint
) -> None:
    text = f"Line No,Temp,{header}\n,K,{row_unit}\nP-1,300,6\n"
    with pytest.raises(InputError) as caught:
        read(tmp_path, text, columns={header: hint})
    message = str(caught.value)
    assert message.startswith(f"list.csv, row 1, column '{header}': [columns] gives the unit '{hint.unit}'")
    assert "which one holds?" in message


@pytest.mark.parametrize(
    ("header", "hint"),
    [
        ("Q1 (m3/h)", ColumnHint("flow_volume", unit="m³/hr")),
        ("P1 [bar]", ColumnHint("pressure", unit="barg")),
        ("Item A (max)", ColumnHint("flow_mass", unit="kg/h")),
        ("Bore (DN)", ColumnHint("size", unit="DN")),
    ],
)
def test_unit_of_hint_that_agrees_or_settles(tmp_path: Path, header: str, hint: ColumnHint) -> None:
    listed = read(tmp_path, f"Line No,{header},T [K]\nP-1,150,300\n", columns={header: hint})
    assert listed.gap(hint.field).tolist() == [0]
    assert listed.unread == ()


def test_hint_names_case_and_takes_the_field_from_another_column(tmp_path: Path) -> None:
    text = "Line No,Column A,Column B,Flow [kg/h]\nP-1,3600,7200,1\n"
    hints = {
        "column a": ColumnHint("flow_mass", unit="kg/h"),
        "Column B": ColumnHint("flow_mass", unit="kg/h", case="Max"),
    }
    listed = read(tmp_path, text, columns=hints)
    assert listed.case.texts == ("normal", "maximum")
    assert listed.number("flow_mass").tolist() == [1.0, 2.0]
    assert listed.unmatched == ("Flow [kg/h]",)
    assert any("'Flow [kg/h]'" in note and "[columns]" in note for note in listed.notes)


def test_hint_with_an_unknown_field_is_refused(tmp_path: Path) -> None:
    with pytest.raises(InputError, match=r"list\.csv, row 1, column 'A': \[columns\] gives the field 'flo'"):
        read(tmp_path, "Line No,A\nP-1,1\n", columns={"A": ColumnHint("flo")})


def test_hint_whose_header_is_not_there_is_an_open_item(tmp_path: Path) -> None:
    hints = {"Flow rte [kg/h]": ColumnHint("flow_mass"), "xyz": ColumnHint("")}
    listed = read(tmp_path, "title\nLine No,Flow rate [kg/h]\nP-1,3600\n", columns=hints)
    assert [(item.text, item.address.row) for item in listed.unread] == [("Flow rte [kg/h]", 2), ("xyz", 2)]
    assert "the closest one is 'Flow rate [kg/h]'" in listed.unread[0].reason
    assert "closest" not in listed.unread[1].reason


def test_hint_that_takes_a_reid_vapour_pressure_is_said(tmp_path: Path) -> None:
    listed = read(tmp_path, "Line No,RVP [psia]\nP-1,9\n", columns={"RVP [psia]": ColumnHint("vapour_pressure")})
    assert listed.has("vapour_pressure")
    assert any("Reid" in note for note in listed.notes)
