"""Number cells: what reads, what is a gap, and what is refused with which words."""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st
from lists import SITE_ATMOSPHERE, one_column, read

from checker.model import Gap

GIVEN = [
    ("12", 12.0), (" 12 ", 12.0), ("+60", 60.0), ("-45", -45.0), ("\u221245", -45.0), ("1.5E+2", 150.0), ("1.5e-3", 0.0015),
    (".5", 0.5), ("5.", 5.0), ("1 234.5", 1234.5), ("1'234.5", 1234.5), ("12\u00a0345", 12345.0), ("1,234.5", 1234.5),
    ("1,234,567", 1234567.0), ("1,87,000", 187000.0), ("45 °C", 45.0), ("45 degC", 45.0), ("318.15 K", 45.0),
    ("113 °F", 45.0), ("53.26851056519498", 53.26851056519498), ("-0", 0.0),
]  # fmt: skip
REFUSED = [
    ("nan", "not a number"), ("Infinity", "not a number"), ("1_000", "_000"), ("0x1F", "product"), ("1e", "'e'"),
    ("٣", "none of the digits 0 to 9"), ("1٣", "٣"), ("½", "not a number"), ("9" * 400, "too long"), ("1e400", "not a finite number"),
    ("1.2.3", "not one number"), ("1,2,3", "not one number"), ("1,234", "reads as 1.234 or as 1234"), ("10,5", "write 10.5"),
    ("7-5", "is it 5 to 7?"), ("-172-47", "-172 to 47 or as -172 to -47"), ("60 0C", "60 °C with the degree sign lost"),
    ("<5", "limit"), ("≥ 5", "limit"), ("max 50", "limit"), ("380+", "limit"), ("~50", "approximation"),
    ("ca. 50", "approximation"), ("3.5/FV", "not a unit"), ("true", "yes or a no"), ("#N/A", "error value of the spreadsheet"),
    ("#REF!", "error value of the spreadsheet"), ("=1+1", "like a formula"), ("?", "a mark"), ("see note 3", "points elsewhere"),
    ("60 barg", "not a unit of temperature"), ("AMB", "range of the site"), ("Saturated", "a state"), ("∞", "infinity"),
    ("DITTO", "repeats the cell above"), ("5-Jul", "7-5 or 5-7"), ("9999", "stand-in"), ("-46100", "was it -46 to 100?"),
    ("100 psig / 150 °F", "two quantities"), ("[3.967, 76.39]", "list of numbers"), ("!123.7", "minus sign"),
]  # fmt: skip
GAPS = [
    ("", Gap.BLANK), ("   ", Gap.BLANK), ("-", Gap.BLANK), ("--", Gap.BLANK), ("—", Gap.BLANK), ("- ", Gap.BLANK),
    ("HOLD", Gap.HOLD), ("ON HOLD", Gap.HOLD), ("Hold 3", Gap.HOLD), ("HOLD-2 12.5", Gap.HOLD), ("TBC", Gap.HOLD),
    ("12.5 (HOLD 4)", Gap.HOLD), ("tbd", Gap.HOLD), ("VTA", Gap.HOLD), ("LATER", Gap.HOLD),
    ("By Vendor", Gap.HOLD), ("TBA", Gap.HOLD), ("N/A", Gap.NOT_APPLICABLE), ("NA", Gap.NOT_APPLICABLE),
    ("n.a.", Gap.NOT_APPLICABLE), ("none", Gap.NOT_APPLICABLE), ("Nil", Gap.NOT_APPLICABLE),
    ("Not applicable", Gap.NOT_APPLICABLE), ("N/R", Gap.NOT_APPLICABLE),
]  # fmt: skip


@pytest.mark.parametrize(("cell", "celsius"), GIVEN)
def test_number_is_read(tmp_path: Path, cell: str, celsius: float) -> None:
    header = "Temp [degC]" if any(letter in cell for letter in "CFK") else "Elev diff [m]"
    listed = read(tmp_path, one_column(header, cell))
    name = "temperature" if listed.has("temperature") else "elevation_change"
    expected = celsius + 273.15 if name == "temperature" else celsius
    if abs(expected) < 10_000:
        assert listed.number(name)[0] == pytest.approx(expected, rel=1e-14)
        assert listed.gap(name)[0] == Gap.GIVEN
    else:
        assert "10000 m: impossible" in listed.refusals[name, 0]


@pytest.mark.parametrize(("cell", "words"), REFUSED)
def test_cell_is_refused_with_its_place(tmp_path: Path, cell: str, words: str) -> None:
    listed = read(tmp_path, one_column("Temp [degC]", "20", cell, "30"))
    assert listed.gap("temperature").tolist() == [Gap.GIVEN, Gap.REFUSED, Gap.GIVEN]
    assert np.isnan(listed.number("temperature")[1])
    sentence = listed.refusals["temperature", 1]
    assert sentence.startswith("list.csv, row 3, column 'Temp [degC]': '")
    assert words in sentence
    assert len(sentence) < 260
    assert [item.line_number for item in listed.unread] == ["P-2"]


@pytest.mark.parametrize(("cell", "gap"), GAPS)
def test_placeholder(tmp_path: Path, cell: str, gap: Gap) -> None:
    listed = read(tmp_path, one_column("Temp [degC]", "20", cell))
    assert listed.gap("temperature").tolist() == [Gap.GIVEN, gap]
    assert np.isnan(listed.number("temperature")[1])
    assert not listed.unread
    held = [(item.line_number, item.field, item.text) for item in listed.holds]
    assert held == ([("P-2", "temperature", cell.strip())] if gap is Gap.HOLD else [])


@pytest.mark.parametrize("word", ["ATM", "atm", "Atmos."])
def test_atmosphere_is_the_sites(tmp_path: Path, word: str) -> None:
    assert read(tmp_path, one_column("Press [barg]", word)).number("pressure")[0] == SITE_ATMOSPHERE
    refused = read(tmp_path, one_column("Temp [degC]", word, "20"))
    assert refused.gap("temperature")[0] == Gap.REFUSED


@pytest.mark.parametrize("word", ["FV", "F/V", "Full Vac", "FULL VACUUM"])
def test_full_vacuum_is_refused_as_an_operating_value(tmp_path: Path, word: str) -> None:
    listed = read(tmp_path, one_column("Press [barg]", word, "1"))
    assert listed.gap("pressure")[0] == Gap.REFUSED
    assert "full vacuum" in listed.refusals["pressure", 0]


IMPOSSIBLE = [
    ("Press [barg]", "-1.0", "pressure", "'-1.0' is 0 bara, at or below 0 bara"),
    ("Press [barg]", "-2", "pressure", "at or below 0 bara"),
    ("Press [barg]", "-0.1 bara", "pressure", "at or below 0 bara"),
    ("Temp [degC]", "-273.15", "temperature", "at or below -273.15 degC"),
    ("Temp [degC]", "-300", "temperature", "at or below -273.15 degC"),
    ("Temp [degC]", "-1 K", "temperature", "at or below -273.15 degC"),
    ("Temp [degC]", "-500 °F", "temperature", "at or below -273.15 degC"),
    ("Temp [degC]", "1e7", "temperature", "at or above"),
    ("ID [mm]", "0", "inside_diameter", "at or below 0 mm"),
    ("ID [mm]", "-6", "inside_diameter", "at or below 0 mm"),
    ("Flow [kg/h]", "-50000", "flow_mass", "is From/To reversed?"),
    ("Flow [kg/h]", "1e308", "flow_mass", "at or above"),
    ("Flow [kg/h]", "1e309", "flow_mass", "not a finite number"),
    ("Visc [cP]", "0", "viscosity", "at or below 0.0001 cP"),
    ("Length [m]", "-42", "length", "at or below 0 m"),
    ("Length [m]", "1e300", "length", "at or above 1e+06 m"),
    ("Size (NPS)", "0", "size", "not above zero"),
    ("Size (NPS)", '-6"', "size", "not above zero"),
    ("Size (NPS)", '7"', "size", "the nearest are NPS 6 and NPS 8"),
]


@pytest.mark.parametrize(("header", "cell", "name", "words"), IMPOSSIBLE)
def test_impossible_value_is_refused_alone(tmp_path: Path, header: str, cell: str, name: str, words: str) -> None:
    listed = read(tmp_path, one_column(header, cell))
    assert listed.gap(name)[0] == Gap.REFUSED
    assert words in listed.refusals[name, 0]
    assert listed.refusals[name, 0].startswith(f"list.csv, row 2, column '{header}': ")
    assert listed.number("density")[0] == 998.0


def test_smallest_possible_values_are_kept(tmp_path: Path) -> None:
    assert read(tmp_path, one_column("Press [barg]", "-0.9999")).number("pressure")[0] == pytest.approx(10.0)
    assert read(tmp_path, one_column("Flow [kg/h]", "0")).number("flow_mass")[0] == 0.0
    minus_zero = read(tmp_path, one_column("Flow [kg/h]", "-0")).number("flow_mass")[0]
    assert minus_zero == 0.0
    assert not np.signbit(minus_zero)


COMMAS = [
    ("10,5", 10.5, ""), ("0,125", 0.125, ""), ("50.000,5", 50000.5, ""), ("1 234,5", 1234.5, ""), ("12", 12.0, ""),
    ("1,234", 1.234, ""), ("1.234", None, "reads as 1.234 or as 1234"), ("100.000", None, "100.000 or as 100000"),
    ("12,3456", 12.3456, ""), ("1.234.567", 1234567.0, ""), ("1.5", 1.5, ""), ("10,5 kg/h", 10.5, ""),
]  # fmt: skip


@pytest.mark.parametrize(("cell", "number", "words"), COMMAS)
@pytest.mark.parametrize("delimiter", [";", "\t", "|"])
def test_decimal_comma(tmp_path: Path, cell: str, number: float | None, words: str, delimiter: str) -> None:
    text = one_column("Flow [kg/h]", cell, "3,5", delimiter=delimiter)
    listed = read(tmp_path, text)
    assert any("Decimal commas" in note for note in listed.notes)
    if number is None:
        assert words in listed.refusals["flow_mass", 0]
    else:
        assert listed.number("flow_mass")[0] == pytest.approx(number / 3600, rel=1e-14)


SIZES = [
    ('6"', 6.0), ("1-1/2\"", 1.5), ("1 1/2", 1.5), ("1½", 1.5), ("1½\"", 1.5), ('1.1/2"', 1.5), ("3/4", 0.75),
    ("¾", 0.75),
    ("DN 150", 6.0), ("DN150", 6.0), ("DN-150", 6.0), ("150NB", 6.0), ("150 mm", 6.0), ("14″", 14.0), ("0.5″", 0.5),
    ("NPS 24", 24.0), ("2 in", 2.0), ("2 inch", 2.0), ("6''", 6.0), ("1.5", 1.5),
]  # fmt: skip


@pytest.mark.parametrize(("cell", "nps"), SIZES)
def test_size_that_says_its_basis(tmp_path: Path, cell: str, nps: float) -> None:
    assert read(tmp_path, one_column("Size", cell)).number("size")[0] == nps


BARE = [
    ("Size (NPS)", {}, 6.0),
    ("Size (DN)", {}, None),
    ("Size", {"size": "NPS"}, 6.0),
    ("Size", {}, None),
    ("NPS", {}, 6.0),
]


@pytest.mark.parametrize(("header", "units", "nps"), BARE)
def test_bare_size_needs_a_basis(tmp_path: Path, header: str, units: dict[str, str], nps: float | None) -> None:
    listed = read(tmp_path, one_column(header, "6"), units=units)
    if nps is None:
        expected = Gap.GIVEN if header == "Size (DN)" else Gap.REFUSED
        assert listed.gap("size")[0] == expected
        assert header == "Size (DN)" or "NPS or DN" in listed.refusals["size", 0]
    else:
        assert listed.number("size")[0] == nps


def test_dn_sizes(tmp_path: Path) -> None:
    for header, units in (("DN", {}), ("Size (mm)", {}), ("Size", {"size": "DN"})):
        assert read(tmp_path, one_column(header, "150", '4"'), units=units).number("size").tolist() == [6.0, 4.0]


def test_a_column_of_inch_marks_decides_its_bare_cells(tmp_path: Path) -> None:
    assert read(tmp_path, one_column("Size", '6"', '8"', "4")).number("size").tolist() == [6.0, 8.0, 4.0]
    mixed = read(tmp_path, one_column("Size", '6"', "DN 150", "4"))
    assert mixed.gap("size").tolist() == [Gap.GIVEN, Gap.GIVEN, Gap.REFUSED]


@pytest.mark.parametrize(
    "cell", ["80/50", '8"x6"', "0600", "1800", '7"', '3 1/4"', "6-8", "8.625", "big", "1" * 5000, "9999"]
)
def test_size_is_refused(tmp_path: Path, cell: str) -> None:
    listed = read(tmp_path, one_column("Size (NPS)", cell))
    assert listed.gap("size")[0] == Gap.REFUSED
    assert listed.refusals["size", 0].startswith("list.csv, row 2, column 'Size (NPS)': '")


def test_nominal_sizes_are_those_of_the_pipe_dimensions() -> None:
    """The NPS of `fluids`, which carries ASME B36.10M; the DN beside some of them from memory of the same table."""
    from fluids import piping

    from checker.intake.sizes import _pairs

    listed = {nps for nps, _ in _pairs()}
    assert set(piping.NPS40) | set(piping.NPS10) | set(piping.NPS120) <= listed
    dn = dict(_pairs())
    assert [dn[nps] for nps in (0.5, 1.25, 2.5, 3.5, 6, 14, 36, 48)] == [15, 32, 65, 90, 150, 350, 900, 1200]


@pytest.mark.parametrize(
    ("cell", "word"),
    [
        ("L", "liquid"), ("LIQ", "liquid"), ("Liquid", "liquid"), ("Liquid Phase", "liquid"), ("V", "gas"),
        ("G", "gas"),
        ("Vapour", "gas"), ("VAPOR", "gas"), ("GAS", "gas"), ("M", "two-phase"), ("Mixed", "two-phase"),
        ("2PH", "two-phase"), ("TWO PHASE", "two-phase"), ("two-phase", "two-phase"), ("V/L", "two-phase"),
        ("L+G", "two-phase"), ("2-phase", "two-phase"), ("S", None), ("solid", None), ("yes", None),
    ],
)  # fmt: skip
def test_phase(tmp_path: Path, cell: str, word: str | None) -> None:
    listed = read(tmp_path, one_column("Phase", cell))
    assert listed.text("phase").text(0) == (word or "")
    assert listed.gap("phase")[0] == (Gap.GIVEN if word else Gap.REFUSED)
    assert word or "write one of liquid, gas, two-phase" in listed.refusals["phase", 0]


@pytest.mark.parametrize(
    ("cell", "word"),
    [("Inlet", "inlet"), ("upstream", "inlet"), ("START", "inlet"), ("outlet", "outlet"), ("end", "outlet")],
)
def test_pressure_basis(tmp_path: Path, cell: str, word: str) -> None:
    assert read(tmp_path, one_column("Press basis", cell)).text("pressure_basis").text(0) == word


@pytest.mark.parametrize(
    ("header", "cell", "text", "gap"),
    [
        ("Service", "CW", "CW", Gap.GIVEN),
        ("Service", " cooling\n water ", "cooling water", Gap.GIVEN),
        ("Service", "HOLD 2", "", Gap.HOLD),
        ("Service", "N/A", "", Gap.NOT_APPLICABLE),
        ("Service", "-", "", Gap.BLANK),
        ("From", "Hold-up drum V-100", "Hold-up drum V-100", Gap.GIVEN),
        ("Fittings", "none", "none", Gap.GIVEN),
        ("Fittings", "N/A", "", Gap.NOT_APPLICABLE),
        ("Insulation", "NONE", "NONE", Gap.GIVEN),
        ("Remarks", "HOLD on routing", "HOLD on routing", Gap.GIVEN),
        ("Service", "=1+1", "=1+1", Gap.GIVEN),
    ],
)
def test_text(tmp_path: Path, header: str, cell: str, text: str, gap: Gap) -> None:
    listed = read(tmp_path, one_column(header, cell))
    name = header.lower()
    assert listed.text(name).text(0) == text
    assert listed.gap(name)[0] == gap
    holds = "HOLD" in cell
    assert [item.field for item in listed.holds] == ([name] if holds else [])


def test_offending_text_is_shortened_and_escaped(tmp_path: Path) -> None:
    listed = read(tmp_path, one_column("Temp [degC]", "\x1b[31m" + "x" * 300, "20"))
    sentence = listed.refusals["temperature", 0]
    assert "\x1b" not in sentence
    assert "'\\x1b[31mxxx" in sentence
    assert "(305 characters)" in sentence


MARKED = [("50*", "'*'"), ("50¹", "'¹'"), ("50 (Note 2)", "'(Note 2)'")]


@pytest.mark.parametrize(("cell", "mark"), MARKED)
def test_footnote_marks_are_told(tmp_path: Path, cell: str, mark: str) -> None:
    listed = read(tmp_path, one_column("Temp [degC]", "20", cell))
    assert listed.number("temperature")[1] == pytest.approx(323.15)
    assert not listed.unread
    told = [note for note in listed.notes if mark in note]
    assert len(told) == 1
    assert "'Temp [degC]'" in told[0]
    assert "3" in told[0]


QUOTED = [
    (("10,5", "11,5"), [10.5, 11.5]), (("10,5", "0,83"), [10.5, 0.83]), (("1,234", "0,83"), [1.234, 0.83]),
    (("1,234", "1,234,567.5"), [1234.0, 1234567.5]), (("1,234", "12,345.6"), [1234.0, 12345.6]),
    (("12,345.6", "187,000"), [12345.6, 187000.0]), (("1,234", "5,678"), None), (("1,234", "12.5"), [1234.0, 12.5]),
    (("10,5", "12.5"), None),
]  # fmt: skip


@pytest.mark.parametrize(("cells", "numbers"), QUOTED)
def test_marks_of_a_comma_delimited_column(tmp_path: Path, cells: tuple[str, str], numbers: list[float] | None) -> None:
    listed = read(tmp_path, one_column("Flow [kg/h]", *cells))
    if numbers is None:
        assert listed.gap("flow_mass")[0] == Gap.REFUSED
    else:
        assert listed.number("flow_mass") == pytest.approx(np.array(numbers) / 3600, rel=1e-14)
        assert any(f"as '{cell}' shows" in note for note in listed.notes for cell in cells)


def test_plain_numbers_of_a_column_with_decimal_commas_are_asked_about(tmp_path: Path) -> None:
    listed = read(tmp_path, one_column("Flow [kg/h]", "10,5", "0,83", "12.345", "7"))
    assert "reads as 12.345 or as 12345" in listed.refusals["flow_mass", 2]
    assert listed.gap("flow_mass").tolist() == [Gap.GIVEN, Gap.GIVEN, Gap.REFUSED, Gap.GIVEN]


@settings(max_examples=150, deadline=None, suppress_health_check=[HealthCheck.function_scoped_fixture])
@given(st.lists(st.text(alphabet=st.characters(exclude_characters="\0", codec="utf-8"), max_size=20), min_size=1))
def test_any_cells_make_a_list_never_a_fault(tmp_path: Path, cells: list[str]) -> None:
    text = one_column("Temp [degC]", *(cell.replace("\r", " ").replace("\n", " ") for cell in cells))
    listed = read(tmp_path, text)
    gaps = listed.gap("temperature")
    assert np.array_equal(np.isfinite(listed.number("temperature")), gaps == Gap.GIVEN)
    assert {index for _, index in listed.refusals} == set(np.flatnonzero(gaps == Gap.REFUSED).tolist())


def test_every_mark_of_the_hold_column_is_an_open_item(tmp_path: Path) -> None:
    marks = ("Y", "3", "H1", "\u2713", "N", "no", "-", "", "0", "HOLD")
    rows = "\n".join(f"P-{index},6,500,{mark}" for index, mark in enumerate(marks))
    listed = read(tmp_path, f"Line No,Size (NPS),Flow (kg/h),Hold\n{rows}\n")
    assert [item.text for item in listed.holds] == ["Y", "3", "H1", "\u2713", "HOLD"]
