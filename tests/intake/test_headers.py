"""Headers: spellings, units, cases, two header rows, units rows, hints."""

from __future__ import annotations

from pathlib import Path

import pytest
from lists import one_column, read

from checker.errors import InputError
from checker.intake.headers import read_header

MATCHED = [
    ("Line No", "line_number", "", ""),
    ("LineNumber", "line_number", "", ""),
    ("LINE #", "line_number", "", ""),
    ("Line Nº", "line_number", "", ""),
    ("Size (NPS)", "size", "NPS", ""),
    ("Size [in]", "size", "in", ""),
    ("Size (DN)", "size", "DN", ""),
    ("DN", "size", "DN", ""),
    ("NPS", "size", "NPS", ""),
    ("Inner Diameter [m]", "inside_diameter", "m", ""),
    ("Oper. Press. (barg)", "pressure", "barg", ""),
    ("Pressure, Kg/cm 2 A", "pressure", "Kg/cm 2 A", ""),
    ("Press bar g", "pressure", "bar g", ""),
    ("Press [bar(g)]", "pressure", "bar(g)", ""),
    ("Normal pressure (psig)", "pressure", "psig", ""),
    ("Max Press [barg]", "pressure", "barg", "maximum"),
    ("Press (barg) max", "pressure", "barg", "maximum"),
    ("Design Press (psig)", "pressure_design", "psig", ""),
    ("Min. Design Temp [°C]", "temperature_design_minimum", "°C", ""),
    ("Temperature (◦C)", "temperature", "◦C", ""),
    ("Temperature(oc)", "temperature", "oc", ""),
    ("Temp C", "temperature", "C", ""),
    ("T [K]", "temperature", "K", ""),
    ("Flow Min [kg/h]", "flow_mass", "kg/h", "minimum"),
    ("Norm. Flow (m³/h)", "flow_volume", "m³/h", "normal"),
    ("Flow, Nm3/h", "flow_standard", "Nm3/h", ""),
    ("Flow kg/h Max", "flow_mass", "kg/h", "maximum"),
    ("Mass Flow (kg/hour)", "flow_mass", "kg/hour", ""),
    ("Rated flow [t/h]", "flow_mass", "t/h", "rated"),
    ("Relief Flow [kg/h]", "flow_mass", "kg/h", "relief"),
    ("Start-up flow [kg/h]", "flow_mass", "kg/h", "start-up"),
    ("Flow design 2 [kg/h]", "flow_mass", "kg/h", "design 2"),
    ("Flow design [m3/h]", "flow_volume", "m3/h", "design"),
    ("Design flow rate [kg/h]", "flow_mass", "kg/h", "design"),
    ("Flow (design case) [kg/h]", "flow_mass", "kg/h", "design"),
    ("Test flow [kg/h]", "flow_mass", "kg/h", "test"),
    ("Flow normal case [kg/h]", "flow_mass", "kg/h", "normal"),
    ("Flow case normal [kg/h]", "flow_mass", "kg/h", "normal"),
    ("Flow intermittent [kg/h]", "flow_mass", "kg/h", "intermittent"),
    ("Max flow (intermittent) [kg/h]", "flow_mass", "kg/h", "maximum intermittent"),
    ("Operating flow [kg/h]", "flow_mass", "kg/h", ""),
    ("ΔP [bar]", "pressure_drop_stated", "bar", ""),
    ("DP [bar/100m]", "pressure_gradient_stated", "bar/100m", ""),
    ("dP/100m [bar]", "pressure_gradient_stated", "bar/100m", ""),
    ("Allow DP (bar)", "pressure_drop_allowed", "bar", ""),
    ("Max allowable velocity [m/s]", "velocity_allowed", "m/s", ""),
    ("\u03c1 [kg/m³]", "density", "kg/m³", ""),
    ("µ (mPa·s)", "viscosity", "mPa·s", ""),
    ("Cp/Cv", "heat_capacity_ratio", "", ""),
    ("P&ID No.", "drawing", "", ""),
    ("Vap Frac (mass)", "vapour_fraction", "mass", ""),
    ("Vapour fraction %", "vapour_fraction", "%", ""),
    ("Vapour fraction [%]", "vapour_fraction", "%", ""),
    ('Size "', "size", '"', ""),
    ('Size ["]', "size", '"', ""),
    ("Flow - Max [kg/h]", "flow_mass", "kg/h", "maximum"),
    ("Corr. Allow. (in)", "corrosion_allowance", "in", ""),
    ("Flow [kg/h] (Note 4)", "flow_mass", "kg/h", ""),
    ("SG", "density", "SG", ""),
    ("flow\nrate [kg/h]", "flow_mass", "kg/h", ""),
]


@pytest.mark.parametrize(("header", "field", "unit", "case"), MATCHED)
def test_header_is_understood(header: str, field: str, unit: str, case: str) -> None:
    reading = read_header(header)
    assert reading is not None
    assert (reading.fields[0].name, reading.unit, reading.case) == (field, unit, case)


@pytest.mark.parametrize(
    "header",
    [
        "Max. Size (inch)",
        "Peak Load [kW]",
        "Design density [kg/m3]",
        "RVP",
        "",
        "x" * 500,
        "\u0420P",
    ],
)
def test_header_that_nothing_claims(header: str) -> None:
    assert read_header(header) is None


def test_every_field_name_and_spelling_finds_its_field() -> None:
    from checker.fields import all_fields

    for field in all_fields():
        for spelling in (field.name, *field.spellings):
            reading = read_header(spelling)
            assert reading is not None, spelling
            assert field in reading.fields, spelling


def test_units_row_and_title_block(tmp_path: Path) -> None:
    text = (
        "LINE LIST,Marrowquay terminal,,\nRev,A,,\n\nLine No,Flow,Press,Temp\n,t/h,kPag,degF\n1,2,3,4\nP-1,36,900,212\n"
    )
    listed = read(tmp_path, text)
    assert listed.line_number == ("P-1",)
    assert listed.number("flow_mass")[0] == pytest.approx(10.0, rel=1e-15)
    assert listed.number("pressure")[0] == pytest.approx(1_000_000.0, rel=1e-15)
    assert listed.number("temperature")[0] == pytest.approx(373.15, rel=1e-12)
    assert list(listed.row) == [7]
    assert any("Units in row 5" in note for note in listed.notes)
    assert any("numbers the columns" in note for note in listed.notes)


def test_grouped_headers_of_two_rows(tmp_path: Path) -> None:
    text = "Line No,Operating,,Design,,Test\n,Press,Temp,Press,Temp,Press\n,barg,°C,barg,°C,barg\nP-1,4,60,10,80,15\n"
    listed = read(tmp_path, text)
    assert listed.number("pressure")[0] == 5e5
    assert listed.number("pressure_design")[0] == 11e5
    assert listed.number("pressure_test")[0] == 16e5
    assert listed.number("temperature_design")[0] == pytest.approx(353.15)
    assert listed.column_of("pressure_design", 0).header == "Design Press"  # type: ignore[union-attr]


@pytest.mark.parametrize(
    ("units", "cell", "field", "value"),
    [
        ({}, "3.6 t/h", "flow_mass", 1.0),
        ({"volume flow": "m3/h"}, "3.6 t/h", "flow_mass", 1.0),
        ({}, "2 m3/s", "flow_volume", 2.0),
        ({}, "1 kmol/s", "flow_standard", 1000.0),
    ],
)
def test_bare_flow_becomes_the_field_of_its_unit(
    tmp_path: Path, units: dict[str, str], cell: str, field: str, value: float
) -> None:
    listed = read(tmp_path, one_column("Flow", cell), units=units)
    assert listed.number(field)[0] == pytest.approx(value, rel=1e-14)


@pytest.mark.parametrize(
    ("header", "words"),
    [
        ("Line No,Size,Size\nP-1,6,6\n", "field size: 'Size' (column 2) and 'Size' (column 3)"),
        ("Line No,Temp [K],TEMP [K]\nP-1,6,6\n", "field temperature: 'Temp [K]' (column 2) and 'TEMP [K]' (column 3)"),
        ("Line No,Flow max [kg/h],Max flow [kg/h]\nP-1,6,6\n", "in the case 'maximum'"),
        ("Line No,Flow [kg/h],Flow\nP-1,6,6\n", "field flow_mass"),
        ("Line No,Flow [kg/h],line no.\nP-1,6,6\n", "field line_number"),
    ],
)
def test_two_columns_for_one_field(tmp_path: Path, header: str, words: str) -> None:
    with pytest.raises(InputError) as caught:
        read(tmp_path, header)
    assert words in str(caught.value)
    assert str(caught.value).startswith("list.csv, row 1: two columns")
    assert "[columns]" in str(caught.value)
    assert caught.value.status == 2


def test_all_doubled_columns_are_named_at_once(tmp_path: Path) -> None:
    with pytest.raises(InputError) as caught:
        read(tmp_path, "Line No,Size,Size,Temp [K],Temp [K]\nP-1,6,6,300,300\n")
    assert len(caught.value.problems) == 2


def test_a_second_remarks_column_stops_nothing(tmp_path: Path) -> None:
    listed = read(tmp_path, "Line No,Temp [K],Remarks,Notes\nP-1,300,a,b\n")
    assert listed.text("remarks").text(0) == "a"
    assert listed.unmatched == ("Notes",)
    assert any("'Notes'" in note for note in listed.notes)


def test_address_of_a_value(tmp_path: Path) -> None:
    listed = read(tmp_path, "title\n\nLine No,Flow Norm [kg/h],Flow Max [kg/h],T [K]\nP-1,3600,7200,300\n")
    address = listed.address("flow_mass", 1)
    assert str(address) == "list.csv, row 4, column 'Flow Max [kg/h]'"
    assert listed.cell("flow_mass", 1) == "7200"
    assert listed.cell("temperature", 1) == "300"
