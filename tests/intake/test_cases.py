"""Cases: by columns, by rows, composite, no-flow, and the contractor's stated results."""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest
from lists import read

from checker.intake.case_names import canonical_case, case_kind
from checker.model import CaseKind, Gap

WIDE = (
    "Line No,Flow Max [kg/h],Flow Min [kg/h],Flow Norm [kg/h],Relief Flow [kg/h],Press [barg],Density [kg/m3],Vel [m/s]\n"
    "P-1,7200,0,3600,,5,998,1.2\n"
    "P-2,HOLD,NNF,3600,36000,5,998,1.3\n"
)


def test_wide_cases_in_their_order(tmp_path: Path) -> None:
    listed = read(tmp_path, WIDE)
    assert listed.case.texts == ("minimum", "normal", "maximum", "relief")
    assert listed.line.tolist() == [0, 0, 0, 0, 1, 1, 1, 1]
    np.testing.assert_allclose(listed.number("flow_mass"), [0, 1, 2, np.nan, 0, 1, np.nan, 10], rtol=1e-14)
    assert listed.gap("flow_mass").tolist() == [0, 0, 0, Gap.BLANK, 0, 0, Gap.HOLD, 0]
    assert listed.case_kind.tolist() == [
        CaseKind.NO_FLOW, CaseKind.CONTINUOUS, CaseKind.CONTINUOUS, CaseKind.INTERMITTENT,
        CaseKind.NO_FLOW, CaseKind.CONTINUOUS, CaseKind.CONTINUOUS, CaseKind.INTERMITTENT,
    ]  # fmt: skip
    assert [(item.line_number, item.address.column) for item in listed.holds] == [("P-2", "Flow Max [kg/h]")]
    assert listed.address("flow_mass", 6).column == "Flow Max [kg/h]"  # type: ignore[union-attr]


def test_shared_values_make_other_cases_composite(tmp_path: Path) -> None:
    listed = read(tmp_path, WIDE)
    assert listed.composite.tolist() == [True, False, True, True] * 2
    assert any(note.startswith("Composite cases") for note in listed.notes)
    own = read(tmp_path, "Line No,Flow Min [kg/h],Flow Max [kg/h],P Min [barg],P Max [barg]\nP-1,1,2,3,4\n")
    assert not own.composite.any()


def test_stated_results_belong_to_the_normal_case(tmp_path: Path) -> None:
    listed = read(tmp_path, WIDE)
    assert listed.gap("velocity_stated").tolist() == [3, 0, 3, 3] * 2
    np.testing.assert_allclose(
        listed.number("velocity_stated"), [np.nan, 1.2, np.nan, np.nan, np.nan, 1.3, np.nan, np.nan]
    )
    single = read(tmp_path, "Line No,Flow Max [kg/h],Vel [m/s]\nP-1,3600,1.5\n")
    assert single.case.texts == ("maximum",)
    assert single.number("velocity_stated").tolist() == [1.5]


def test_a_case_without_a_column_of_its_own_has_no_value(tmp_path: Path) -> None:
    listed = read(tmp_path, "Line No,Flow Min [kg/h],Flow Max [kg/h],P Max [barg],T [K]\nP-1,1,2,3,300\n")
    assert listed.gap("pressure").tolist() == [Gap.BLANK, Gap.GIVEN]
    assert listed.number("temperature").tolist() == [300.0, 300.0]


def test_normal_pressure_beside_a_maximum_one(tmp_path: Path) -> None:
    listed = read(
        tmp_path, "Line No,Flow Norm [kg/h],Flow Max [kg/h],Normal pressure [bara],Max pressure [bara]\nP-1,1,2,3,4\n"
    )
    assert listed.number("pressure").tolist() == [3e5, 4e5]


def test_no_case_named_is_one_normal_case(tmp_path: Path) -> None:
    listed = read(tmp_path, "Line No,Flow [kg/h]\nP-1,3600\nP-1,0\n")
    assert listed.line_number == ("P-1", "P-1")
    assert [listed.case.text(index) for index in range(2)] == ["normal", "normal"]
    assert listed.case_kind.tolist() == [CaseKind.CONTINUOUS, CaseKind.NO_FLOW]


def test_case_column(tmp_path: Path) -> None:
    text = (
        "Line No,Case,Flow [kg/h],Vel [m/s]\nP-1,Norm,1,1\nP-1,MAX,2,2\nP-1,Start-up,3,3\nP-1,,4,4\nP-1,Hydrotest,5,5\n"
    )
    listed = read(tmp_path, text)
    assert [listed.case.text(index) for index in range(5)] == ["normal", "maximum", "start-up", "", "hydrotest"]
    assert listed.case_kind.tolist() == [0, 0, CaseKind.INTERMITTENT, CaseKind.UNKNOWN, CaseKind.CONTINUOUS]
    assert listed.number("velocity_stated").tolist() == [1, 2, 3, 4, 5]
    assert not listed.composite.any()


def test_case_column_beside_columns_that_name_a_case(tmp_path: Path) -> None:
    listed = read(tmp_path, "Line No,Case,Flow Max [kg/h],T [K]\nP-1,normal,1,300\n")
    assert listed.unmatched == ("Flow Max [kg/h]",)
    assert any("'Flow Max [kg/h]'" in note for note in listed.notes)
    assert [(item.text, item.address.row) for item in listed.unread] == [("Flow Max [kg/h]", 1)]
    assert "case 'maximum'" in listed.unread[0].reason


def test_a_contradictory_or_open_flow_is_not_no_flow(tmp_path: Path) -> None:
    listed = read(tmp_path, "Line No,Flow [kg/h],Vol flow [m3/h]\nP-1,0,5\nP-2,0,HOLD\nP-3,0,\n")
    assert listed.case_kind.tolist() == [CaseKind.CONTINUOUS, CaseKind.CONTINUOUS, CaseKind.NO_FLOW]


@pytest.mark.parametrize(
    ("name", "canonical", "kind"),
    [
        ("Norm.", "normal", CaseKind.CONTINUOUS), ("MAX", "maximum", CaseKind.CONTINUOUS),
        ("Turndown", "minimum", CaseKind.CONTINUOUS), ("Normal case", "normal", CaseKind.CONTINUOUS),
        ("Case 2", "case 2", CaseKind.CONTINUOUS), ("Design 1", "design 1", CaseKind.CONTINUOUS),
        ("Design", "design", CaseKind.MECHANICAL_ONLY), ("Mechanical", "mechanical", CaseKind.MECHANICAL_ONLY),
        ("Relief (fire)", "relief fire", CaseKind.INTERMITTENT), ("Steam out", "steam-out", CaseKind.INTERMITTENT),
        ("Blow-down", "blowdown", CaseKind.INTERMITTENT), ("Loading", "loading", CaseKind.CONTINUOUS),
        ("Winter", "winter", CaseKind.CONTINUOUS), ("Ship 4", "ship 4", CaseKind.CONTINUOUS),
        ("No flow", "no flow", CaseKind.NO_FLOW), ("no-flow", "no flow", CaseKind.NO_FLOW),
        ("NNF", "nnf", CaseKind.NO_FLOW), ("Normally no flow", "normally no flow", CaseKind.NO_FLOW),
        ("Low flow", "low flow", CaseKind.CONTINUOUS), ("Normal flow", "normal", CaseKind.CONTINUOUS),
        ("intermittent", "intermittent", CaseKind.INTERMITTENT),
        ("minimum intermittent", "minimum intermittent", CaseKind.INTERMITTENT),
        ("intermittent max", "intermittent max", CaseKind.INTERMITTENT),
        ("50 % of normal", "50 % of normal", CaseKind.CONTINUOUS), ("50% of Normal", "50 % of normal", CaseKind.CONTINUOUS),
        ("Normal +10 %", "normal + 10 %", CaseKind.CONTINUOUS), ("Normal \u221210 %", "normal - 10 %", CaseKind.CONTINUOUS),
        ("Shut-in", "shut-in", CaseKind.NO_FLOW), ("N.N.F.", "n n f", CaseKind.NO_FLOW),
        ("Settle out", "settle-out", CaseKind.NO_FLOW), ("Normally nil", "normally nil", CaseKind.NO_FLOW),
        ("maxi", "maximum", CaseKind.CONTINUOUS), ("Mín.", "minimum", CaseKind.CONTINUOUS),
        ("Démarrage", "start-up", CaseKind.INTERMITTENT), ("Full vacuum", "full vacuum", CaseKind.MECHANICAL_ONLY),
        ("min", "minimum", CaseKind.CONTINUOUS), ("Design flow", "design", CaseKind.MECHANICAL_ONLY),
    ],
)  # fmt: skip
def test_case_names(name: str, canonical: str, kind: CaseKind) -> None:
    assert canonical_case(name) == canonical
    assert case_kind(canonical_case(name)) == kind
