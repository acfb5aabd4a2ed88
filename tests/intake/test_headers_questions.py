"""Headers that could mean several things: asked with the readings, settled by unit, cells or ``[columns]``."""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest
from lists import quoted, read

from checker.criteria.hints import ColumnHint
from checker.errors import InputError
from checker.model import Gap, LineList


def listed_with(folder: Path, header: str, *cells: str, **settings: object) -> LineList:
    """Read a list with one column of interest beside a flow that is read."""
    rows = "".join(f"P-{index},5,{quoted(cell)}\n" for index, cell in enumerate(cells, start=1))
    return read(folder, f"Line No,Mass flow [kg/h],{quoted(header)}\n{rows}", **settings)  # type: ignore[arg-type]


def sentence(listed: LineList, header: str) -> str:
    return " ".join(item.reason for item in listed.unread if item.text == header)


@pytest.mark.parametrize(
    ("header", "cells", "words"),
    [
        ("DP", ("10", "12"), ["pressure_design", "pressure_drop_stated", "[columns]"]),
        ("D.P.", ("10",), ["pressure_design", "pressure_drop_stated"]),
        ("DP [bar]", ("10",), ["pressure_design", "pressure_drop_stated", "'bar'"]),
        ("DP", ("10 bar",), ["pressure_design", "pressure_drop_stated"]),
        ("ΔP", ("0.2",), ["pressure_drop_stated", "pressure_gradient_stated"]),
        ("PS", ("10", "12"), ["pressure_design", "painting"]),
        ("Wall", ("40", "80"), ["schedule", "wall_thickness"]),
        ("Bore", ("100", "80"), ["size", "inside_diameter"]),
        ("Bore [mm]", ("100",), ["size", "inside_diameter"]),
        ("Max velocity (m/s)", ("3",), ["velocity_allowed", "velocity_stated", "maximum case"]),
        ("Max vel", ("3",), ["velocity_allowed", "velocity_stated"]),
        ("Pmax (barg)", ("3",), ["(pressure)", "pressure_design"]),
        ("Tmax (C)", ("3",), ["(temperature)", "temperature_design"]),
        ("Tmin (C)", ("3",), ["(temperature)", "temperature_design_minimum"]),
    ],
)
def test_header_of_several_fields_is_a_question(
    tmp_path: Path, header: str, cells: tuple[str, ...], words: list[str]
) -> None:
    listed = listed_with(tmp_path, header, *cells)
    asked = sentence(listed, header)
    assert all(word in asked for word in words), asked
    assert not any(np.isfinite(values).any() for name, values in listed.numbers.items() if name != "flow_mass")
    assert next(m.remark for m in listed.matching if m.header == header) == asked


@pytest.mark.parametrize(
    ("header", "cell", "field", "si"),
    [
        ("DP (barg)", "10", "pressure_design", 1.1e6),
        ("DP (bar/100m)", "1", "pressure_gradient_stated", 1000.0),
        ("DP", "10 barg", "pressure_design", 1.1e6),
        ("DP", "1 bar/100m", "pressure_gradient_stated", 1000.0),
        ("dP [bar]", "1", "pressure_drop_stated", 1e5),
        ("PS (barg)", "10", "pressure_design", 1.1e6),
        ("Wall", "7.1 mm", "wall_thickness", 0.0071),
        ("Bore", "DN 80", "size", 3.0),
    ],
)
def test_unit_settles_the_question(tmp_path: Path, header: str, cell: str, field: str, si: float) -> None:
    listed = listed_with(tmp_path, header, cell)
    assert listed.number(field)[0] == pytest.approx(si, rel=1e-12)
    assert "could be" not in sentence(listed, header)


@pytest.mark.parametrize(
    ("header", "cells", "field"),
    [("PS", ("P1A", "P2"), "painting"), ("Wall", ("SCH 40", "STD"), "schedule")],
)
def test_cells_that_are_no_numbers_settle_the_question(
    tmp_path: Path, header: str, cells: tuple[str, ...], field: str
) -> None:
    listed = listed_with(tmp_path, header, *cells)
    assert listed.text(field).text(0) == cells[0]


@pytest.mark.parametrize("field", ["pressure_drop_stated", "pressure_design"])
def test_columns_of_the_criteria_settle_the_question(tmp_path: Path, field: str) -> None:
    unit = {"pressure_drop_stated": "bar", "pressure_design": "bara"}[field]
    listed = listed_with(tmp_path, "DP", "10", columns={"DP": ColumnHint(field, unit=unit)})
    assert listed.number(field)[0] == pytest.approx(1e6)


def test_doubtful_column_beside_a_certain_one_takes_nothing_from_it(tmp_path: Path) -> None:
    listed = read(tmp_path, "Line No,DP,ΔP [bar],Flow [kg/h]\nP-1,10,0.5,5\n")
    assert listed.number("pressure_drop_stated")[0] == pytest.approx(5e4)
    assert "could be" in sentence(listed, "DP")
    assert listed.gap("pressure_gradient_stated").tolist() == [Gap.REFUSED]


@pytest.mark.parametrize(
    "header", ["Vapour fraction", "Vap. Frac. [%]", "VF", "Vapor fraction [-]", "Outlet vapor fraction"]
)
def test_vapour_fraction_without_its_basis_is_asked(tmp_path: Path, header: str) -> None:
    listed = listed_with(tmp_path, header, "0.2")
    assert "by mass or by mole" in sentence(listed, header)
    assert not any(np.isfinite(values).any() for name, values in listed.numbers.items() if "fraction" in name)


@pytest.mark.parametrize(
    "header", ["Mole fraction vapour", "Vap frac (mol)", "Vapour fraction [mol%]", "Molar vapor fraction"]
)
def test_mole_fraction_is_no_mass_fraction(tmp_path: Path, header: str) -> None:
    listed = listed_with(tmp_path, header, "0.2")
    assert "mole fraction is not a mass fraction" in sentence(listed, header)
    assert not np.isfinite(listed.number("vapour_fraction")).any()


@pytest.mark.parametrize(
    ("header", "cell"),
    [
        ("Vapour fraction (mass)", "0.2"), ("Vapour fraction [wt%]", "20"), ("Steam quality", "0.2"),
        ("Mass% vap frac", "20"), ("vapour_fraction", "0.2"), ("Vapour fraction", "20 wt%"),
        ("Vapour mass fraction [%]", "20"), ("Fraction massique vapeur", "0.2"),
    ],
)  # fmt: skip
def test_mass_fraction_is_read(tmp_path: Path, header: str, cell: str) -> None:
    assert listed_with(tmp_path, header, cell).number("vapour_fraction")[0] == pytest.approx(0.2)


def test_percent_in_a_cell_does_not_say_by_mass(tmp_path: Path) -> None:
    listed = listed_with(tmp_path, "Vapour fraction", "20 %", "20 wt%")
    assert not np.isfinite(listed.number("vapour_fraction")).any()


def test_criteria_say_that_a_fraction_is_by_mass(tmp_path: Path) -> None:
    hint = {"Vap frac": ColumnHint("vapour_fraction", unit="kg/kg")}
    assert listed_with(tmp_path, "Vap frac", "0.2", columns=hint).number("vapour_fraction")[0] == 0.2


@pytest.mark.parametrize(
    ("header", "words"),
    [
        ("Max. Size (inch)", "largest or smallest size"),
        ("Elevation [m]", "outlet minus inlet"),
        ("MAWP [barg]", "need not be its design pressure"),
        ("From → To", "a column each"),
        ("Opr. Presure (barg)", "closest field is pressure"),
        ("Desing Temp (°C)", "closest field is temperature_design"),
    ],
)
def test_header_that_is_nearly_a_field_is_named_with_it(tmp_path: Path, header: str, words: str) -> None:
    listed = listed_with(tmp_path, header, "6")
    assert words in sentence(listed, header)
    assert "[columns]" in sentence(listed, header)


def test_near_header_of_a_field_that_is_read_is_no_open_item(tmp_path: Path) -> None:
    listed = read(tmp_path, "Line No,Size (NPS),Max. Size (inch),Remarcs,Flow [kg/h]\nP-1,6,8,x,5\n")
    assert listed.unread == ()
    remarks = {match.header: match.remark for match in listed.matching}
    assert "largest" in remarks["Max. Size (inch)"]
    assert "remarks" in remarks["Remarcs"]


def test_two_columns_headed_alike_must_be_renamed(tmp_path: Path) -> None:
    with pytest.raises(InputError, match=r"Both are headed alike.*rename one"):
        read(tmp_path, "Line No,Size,Size\nP-1,6,6\n")


def test_two_tables_side_by_side_are_a_question(tmp_path: Path) -> None:
    with pytest.raises(InputError, match=r"two tables stand side by side.*column 4.*which of the two"):
        read(tmp_path, "Line No,Size,Flow [kg/h],Line No,Size,Flow [kg/h]\nP-1,6,5,P-2,6,7\n")


@pytest.mark.parametrize(
    ("header", "units"), [("DP", {"pressure": "barg"}), ("Bore", {"diameter": "mm"}), ("Flow", {"volume flow": "m3/h"})]
)
def test_units_of_the_criteria_do_not_say_what_a_header_means(
    tmp_path: Path, header: str, units: dict[str, str]
) -> None:
    listed = read(tmp_path, f"Line No,rho [kg/m3],{header}\nP-1,980,10\n", units=units)
    assert "could be" in sentence(listed, header)
    assert not any(np.isfinite(values).any() for name, values in listed.numbers.items() if name != "density")


@pytest.mark.parametrize(
    "header",
    ["Design P & T (C)", "Design P & T", "Press/Temp (barg)", "Oper/Des/Test P (barg)", "Design P / Design T", "P/T"],
)
def test_header_of_several_values_is_an_open_item(tmp_path: Path, header: str) -> None:
    listed = listed_with(tmp_path, header, "10")
    assert "holds several values in one column" in sentence(listed, header)
    assert [name for name, values in listed.numbers.items() if np.isfinite(values).any()] == ["flow_mass"]
