"""Flows by columns: none that a contractor wrote is left out unseen, and what its cells make of the case."""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest
from lists import read

from checker.criteria.hints import ColumnHint
from checker.errors import InputError
from checker.model import CaseKind, Gap


def test_a_flow_without_a_case_beside_one_that_names_a_case_is_the_normal_one(tmp_path: Path) -> None:
    listed = read(tmp_path, "Line No,Flow [m3/h],Flow max [m3/h]\nP-1,900,100\n")
    assert listed.case.texts == ("normal", "maximum")
    np.testing.assert_allclose(listed.number("flow_volume") * 3600, [900, 100], rtol=1e-14)


@pytest.mark.parametrize("other", ["Flow relief [kg/h]", "Flow design [kg/h]", "Flow min [Nm3/h]", "Rated flow [kg/h]"])
def test_the_flows_are_one_family(tmp_path: Path, other: str) -> None:
    listed = read(tmp_path, f"Line No,{other},Flow [m3/h]\nP-1,100,3600\n")
    assert "normal" in listed.case.texts
    volume = dict(zip([listed.case.text(index) for index in range(2)], listed.number("flow_volume"), strict=True))
    assert volume["normal"] == 1.0
    assert sum(np.isfinite(list(volume.values()))) == 1


@pytest.mark.parametrize(
    "header",
    [
        "Flow [m3/h],Flow normal [m3/h],Flow max [m3/h]",
        "Flow [m3/h],Flow normal [m3/h],Temp [K]",
        "Flow [m3/h],Flow normal [kg/h],Flow max [kg/h]",
    ],
)
def test_a_flow_without_a_case_beside_the_normal_one_is_asked_about(tmp_path: Path, header: str) -> None:
    with pytest.raises(InputError, match=r"^list\.csv, row 1.*two columns for .*\[columns\]"):
        read(tmp_path, f"Line No,{header}\nP-1,1,2,3\n")


def test_columns_of_the_criteria_settle_two_normal_flows(tmp_path: Path) -> None:
    text = "Line No,Flow [m3/h],Flow normal [m3/h],Flow max [m3/h]\nP-1,3600,7200,10800\n"
    rated = read(tmp_path, text, columns={"Flow [m3/h]": ColumnHint("flow_volume", case="rated")})
    assert rated.case.texts == ("normal", "maximum", "rated")
    np.testing.assert_allclose(rated.number("flow_volume"), [2, 3, 1], rtol=1e-14)
    normal = read(tmp_path, text, columns={"Flow [m3/h]": ColumnHint("flow_volume", case="normal")})
    assert normal.number("flow_volume").tolist() == [1, 3]
    assert any("'Flow normal [m3/h]'" in note and "[columns]" in note for note in normal.notes)
    ignored = read(tmp_path, text, columns={"Flow [m3/h]": ColumnHint("")})
    assert ignored.number("flow_volume").tolist() == [2, 3]
    assert ignored.unread == ()


def test_mass_flow_beside_a_normal_volume_flow_of_one_case(tmp_path: Path) -> None:
    listed = read(tmp_path, "Line No,Mass flow [kg/h],Normal flow [Nm3/h]\nP-1,3600,7200\n")
    assert listed.case.texts == ("normal",)
    assert listed.number("flow_mass").tolist() == [1.0]
    assert np.isfinite(listed.number("flow_standard")).all()


def test_no_pressure_is_left_in_no_case(tmp_path: Path) -> None:
    listed = read(tmp_path, "Line No,Flow [kg/h],Press [bara],Max press [bara]\nP-1,3600,2,5\n")
    assert listed.case.texts == ("normal", "maximum")
    assert listed.number("pressure").tolist() == [2e5, 5e5]
    assert listed.number("flow_mass").tolist() == [1.0, 1.0]


def test_design_flow_is_a_case_that_is_judged_where_it_is_given(tmp_path: Path) -> None:
    cells = ["100", "", "N/A", "HOLD", "<7", "0"]
    rows = "".join(f"P-{index},90,{cell}\n" for index, cell in enumerate(cells))
    listed = read(tmp_path, "Line No,Flow normal [m3/h],Flow design [m3/h]\n" + rows)
    assert listed.case.texts == ("normal", "design")
    assert listed.unmatched == ()
    assert listed.case_kind.tolist()[1::2] == [
        CaseKind.CONTINUOUS, CaseKind.MECHANICAL_ONLY, CaseKind.MECHANICAL_ONLY, CaseKind.CONTINUOUS,
        CaseKind.CONTINUOUS, CaseKind.NO_FLOW,
    ]  # fmt: skip


@pytest.mark.parametrize("name", ["design", "test", "mechanical", "Hydrotest", "Mechanical design"])
def test_mechanical_cases_of_rows(tmp_path: Path, name: str) -> None:
    listed = read(tmp_path, f"Line No,Case,Flow [kg/h],T [K]\nP-1,{name},5,1\nP-2,{name},,1\nP-3,{name},TBC,1\n")
    assert listed.case_kind.tolist() == [CaseKind.CONTINUOUS, CaseKind.MECHANICAL_ONLY, CaseKind.CONTINUOUS]
    without = read(tmp_path, f"Line No,Case,T [K]\nP-1,{name},300\n")
    assert without.case_kind.tolist() == [CaseKind.MECHANICAL_ONLY]


@pytest.mark.parametrize("name", ["no flow", "no-flow", "NNF"])
def test_no_flow_by_name(tmp_path: Path, name: str) -> None:
    rows = "".join(f"P-{index},{name},{cell},1\n" for index, cell in enumerate(["0", "", "NNF", "5", "HOLD"]))
    listed = read(tmp_path, "Line No,Case,Flow [kg/h],T [K]\n" + rows)
    assert listed.case_kind.tolist() == [CaseKind.NO_FLOW] * 3 + [CaseKind.CONTINUOUS] * 2
    assert listed.case.texts == (name.lower().replace("-", " "),)


def test_not_applicable_in_one_case_is_no_such_case(tmp_path: Path) -> None:
    rows = "P-1,1,N/A,N/A\nP-2,1,,2\nP-3,N/A,n.a.,N/A\nP-4,1,2,HOLD\n"
    listed = read(tmp_path, "Line No,Flow norm [kg/h],Flow max [kg/h],Relief flow [kg/h]\n" + rows)
    no, on, short = CaseKind.NO_FLOW, CaseKind.CONTINUOUS, CaseKind.INTERMITTENT
    assert listed.case_kind.tolist() == [on, no, no, on, on, short, on, on, short, on, on, short]
    assert listed.gap("flow_mass")[4] == Gap.BLANK
    shared = read(tmp_path, "Line No,Flow [kg/h],P min [bara],P max [bara]\nP-1,N/A,1,2\n")
    assert shared.case_kind.tolist() == [on, on]


@pytest.mark.parametrize(
    ("header", "unit", "cell"),
    [
        ("Flow guaranteed [m3/h]", "", "5"),
        ("50 % of normal flow [m3/h]", "", "5"),
        ("Relief load [kg/h]", "", "5"),
        ("Q [m3/h]", "", "5"),
        ("Contract flow", "m3/h", "5"),
        ("Contract flow", "", "5 m3/h"),
        ("Contract flow", "", "5"),
        ("Winter design flow kg/h", "", ""),
        ("Flow " + "of the contract " * 10, "", "7"),
    ],
)
def test_a_flow_that_is_not_understood_is_an_open_item(tmp_path: Path, header: str, unit: str, cell: str) -> None:
    listed = read(tmp_path, f"Line No,Temp,{header}\n,K,{unit}\nP-1,300,{cell}\n")
    assert listed.unmatched == (header.strip(),)
    assert [(item.text, item.address.row) for item in listed.unread] == [(header.strip(), 1)]
    assert "states a flow" in listed.unread[0].reason


@pytest.mark.parametrize(
    ("header", "cell"),
    [
        ("Flow diagram no", "12"),
        ("Flow area [m2]", "5"),
        ("Overflow", "5"),
        ("Flow direction", "up"),
        ("Duty [kW]", "5"),
    ],
)
def test_what_is_no_flow_is_no_open_item(tmp_path: Path, header: str, cell: str) -> None:
    listed = read(tmp_path, f"Line No,Temp [K],{header}\nP-1,300,{cell}\n")
    assert listed.unmatched == (header,)
    assert listed.unread == ()


@pytest.mark.parametrize(
    "header",
    [
        "Vapour pressure (RVP) [psia]",
        "Vapour pressure (Reid) [psia]",
        "RVP",
        "R.V.P. [psia]",
        "Reid vapor pressure, psia",
    ],
)
def test_a_reid_vapour_pressure_is_no_true_one(tmp_path: Path, header: str) -> None:
    quoted = f'"{header}"'
    listed = read(tmp_path, f"Line No,Temp [K],{quoted}\nP-1,300,9\n")
    assert not listed.has("vapour_pressure")
    assert listed.unmatched == (header,)
    assert [(item.text, str(item.address)) for item in listed.unread] == [
        (header, f"list.csv, row 1, column '{header}'")
    ]
    assert "no true vapour pressure" in listed.unread[0].reason
