"""Equipment lists: what is read of them, and what is refused with which sentence."""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest

from checker.errors import InputError
from checker.intake.equipment import read_equipment
from checker.intake.equipment_fields import KINDS, equipment_fields, field_of_key, kind_of

ATMOSPHERE = 101_325.0


def listed(folder: Path, text: str) -> Path:
    path = folder / "equipment.csv"
    path.write_text(text, encoding="utf-8")
    return path


def test_numbers_become_si_and_each_keeps_its_row(tmp_path: Path) -> None:
    text = (
        "Equipment of the tank farm\nTag No;Type;Oper. Press. (kPag);Elev. [m];NPSHr [m];Rated flow [m3/h];Suction (DN)\n"
        "V-101;drum;50;6,5;;;\nP-101A/B;centrifugal pump;;0,5;2,8;72;150\n"
    )
    found = read_equipment(listed(tmp_path, text.replace("Oper. Press.", "Oper press")), atmosphere=100_000.0)
    assert found.tag == ("V-101", "P-101A/B")
    assert found.kind == ("vessel", "pump")
    assert found.row.tolist() == [3, 4]
    np.testing.assert_allclose(found.numbers["pressure"], [150_000.0, np.nan])
    np.testing.assert_allclose(found.numbers["elevation"], [6.5, 0.5])
    np.testing.assert_allclose(found.numbers["rated_flow"], [np.nan, 0.02])
    np.testing.assert_allclose(found.numbers["suction_size"], [np.nan, 6.0])
    assert not found.unread
    assert not found.unmatched


def test_what_cannot_be_read_is_told_with_its_place(tmp_path: Path) -> None:
    text = (
        "tag,kind,pressure [bar],elevation [m],set_pressure [barg],colour\n"
        "V-1,flux box,3,HOLD,9 to 10,red\nV-2,TBC,2,<5,abc,blue\n"
    )
    found = read_equipment(listed(tmp_path, text))
    said = {(item.address.row, item.address.column): item.reason for item in found.unread}
    assert "gauge or absolute" in said[1, "pressure [bar]"]
    assert "no kind of equipment" in said[2, "kind"]
    assert "states two values" in said[2, "set_pressure [barg]"]
    assert "limit" in said[3, "elevation [m]"]
    assert "'abc'" in said[3, "set_pressure [barg]"]
    assert [(item.line_number, item.field) for item in found.holds] == [("V-2", "kind"), ("V-1", "elevation")]
    assert all(np.isnan(values).all() for values in found.numbers.values())
    assert found.unmatched == ("colour",)
    assert found.kind == ("", "")


@pytest.mark.parametrize(
    ("text", "said"),
    [
        ("tag,kind\n", "no equipment"),
        ("tag,kind\nV-1,vessel\nv-1,vessel\n", "stands on row 2 too"),
        ("tag,elev [m],elevation [m]\nV-1,2,3\n", "both say the elevation"),
        ("tag,kind\n,vessel\n", "values but no tag"),
        ("tag,kind\nV-1,vessel,9\n", "more cells than the header"),
        ("name,colour\nV-1,red\n", "no table found"),
    ],
)
def test_a_list_that_cannot_be_used_is_refused(tmp_path: Path, text: str, said: str) -> None:
    with pytest.raises(InputError, match=said):
        read_equipment(listed(tmp_path, text))


def test_every_spelling_means_one_field_and_every_kind_is_known() -> None:
    spellings = [text for each in equipment_fields() for text in (each.field.name, *each.field.spellings)]
    assert len(field_of_key()) == len({text.replace(" ", "").replace("_", "") for text in spellings}) == len(spellings)
    assert all(kind_of(kind) == kind for kind in KINDS)
    assert kind_of("Knock-Out Drum") == "vessel"
    assert kind_of("") == ""
