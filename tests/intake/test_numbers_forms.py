"""Every form in which lists write one number or two: value, range, limit, approximation, footnote mark, unit."""

from __future__ import annotations

import math
from pathlib import Path

import pytest
from lists import one_column, read
from number_columns import ATMOSPHERE, assert_refused, assert_values, context, reading

from checker.intake.number_cells import record_of
from checker.model import Gap
from checker.units import read_unit

NBSP, NARROW, THIN = "\u00a0", "\u202f", "\u2009"
ONE_NUMBER = [
    ("50", 50.0), ("+60", 60.0), ("-45", -45.0), ("\u221245", -45.0), ("- 45", -45.0), ("50.", 50.0), (".5", 0.5),
    ("1.5E+2", 150.0), ("1.5e-3", 0.0015), ("1.55E 00", None), ("1 234.5", 1234.5), (f"1{NBSP}234.5", 1234.5),
    (f"1{NARROW}234", 1234.0), (f"1{THIN}234{THIN}567", 1234567.0), ("1'234.5", 1234.5), ("1\u2019234", 1234.0),
    ("1,234.5", 1234.5), ("1,234,567", 1234567.0), ("1,87,000", 187000.0), ("12,34,56,789", 123456789.0),
    ("1.234.567", 1234567.0), ("3.2999999999999997e-6", 3.2999999999999997e-6), ("-0", 0.0),
    ("2.98x10-6", 2.98e-6), ("2.98\u00d710\u207b\u2076", 2.98e-6), ("2.98 x 10^-6", 2.98e-6), ("2.98X10^6", 2.98e6),
    ("2.98 \u00d7 10\u2076", 2.98e6), ("2.98*10^3", 2980.0), ("2.98\u00b710^3", 2980.0), ("2.98x10+3", 2980.0),
    ("2.98 x 10**3", 2980.0), ("-2.98x10-6", -2.98e-6), ("10^3", 1000.0), ("10\u207b\u00b3", 0.001), ("-10^2", -100.0),
]  # fmt: skip


@pytest.mark.parametrize(("cell", "number"), ONE_NUMBER)
def test_one_number(cell: str, number: float | None) -> None:
    found = reading("elevation", cell)
    if number is None:
        assert found.gap is Gap.REFUSED
    else:
        assert_values(found, number)


WITH_UNIT = [
    ("pressure", "5 bara", 500_000.0), ("pressure", "5barg", 600_000.0), ("pressure", "5 (barg)", 600_000.0),
    ("pressure", "5 kg/cm2g", 5 * 98_066.5 + ATMOSPHERE), ("pressure", "5 Kg/cm 2 A", 5 * 98_066.5),
    ("temperature", "50 \u00b0C", 323.15), ("temperature", "50 deg C", 323.15), ("temperature", "122 \u00b0F", 323.15),
    ("temperature", "323.15K", 323.15), ("temperature", "50\u2103", 323.15), ("volume flow", "36 m\u00b3/h", 0.01),
    ("volume flow", "2.98x10-6m3/hr", 2.98e-6 / 3600), ("volume flow", "600 l/min", 0.01), ("flow", "60 kg/min", 1.0),
    ("closure time", "5 min", 300.0), ("gradient", "0.45 bar / 100 m", 450.0), ("viscosity", "1e-3 Pa*s", 0.001),
    ("flow", "1.55E+03kg/h", 1550 / 3600),
]  # fmt: skip


@pytest.mark.parametrize(("column", "cell", "value"), WITH_UNIT)
def test_unit_in_the_cell(column: str, cell: str, value: float) -> None:
    assert_values(reading(column, cell), value)
    assert_values(reading(column, cell, unit=None), value)


RANGES = [
    ("5-7", 5, 7), ("5 \u2013 7", 5, 7), ("5\u20147", 5, 7), ("5~7", 5, 7), ("5\uff5e7", 5, 7), ("5 to 7", 5, 7),
    ("5to7", 5, 7), ("5 .. 7", 5, 7), ("5..7", 5, 7), ("5...7", 5, 7), ("5\u20267", 5, 7), ("-29 to 38", -29, 38),
    ("-29/+60", -29, 60), ("-29-+60", -29, 60), ("-172--47", -172, -47), ("-29~38", -29, 38), ("50 / 60", 50, 60),
    ("60/50", 50, 60), ("50 & 60", 50, 60), ("50 and 60", 50, 60), ("50 or 60", 50, 60), ("50\u00b15", 45, 55),
    ("50 +/- 5", 45, 55), ("15 THROUGH 350", 15, 350), ("15 thru 350", 15, 350), ("from 5 to 7", 5, 7),
    ("between 5 and 7", 5, 7), ("5.5-7.25", 5.5, 7.25), ("1e1-2e2", 10, 200), ("5 to 7 \u00b0C", 5, 7),
    ("5 \u00b0C - 7 \u00b0C", 5, 7), ("5-7\u00b0C", 5, 7), ("5 degC to 7", 5, 7), ("41-44.6 \u00b0F", 5, 7),
    ("50 \u00b0C \u00b1 5", 45, 55), ("5-7 (Note 2)", 5, 7), ("5-7*", 5, 7),
]  # fmt: skip


@pytest.mark.parametrize(("cell", "low", "high"), RANGES)
def test_range_keeps_both_ends(cell: str, low: float, high: float) -> None:
    assert_values(reading("temperature", cell), low + 273.15, high + 273.15)
    record = record_of(cell, context("temperature"))
    assert record.text == cell
    assert record.values == pytest.approx((low + 273.15, high + 273.15), rel=1e-12)
    assert len(record.numbers) == 2
    assert record.numbers[0] < record.numbers[1]


def test_units_of_a_range() -> None:
    assert_values(reading("pressure", "5-7 barg"), 6e5, 8e5)
    assert_values(reading("pressure", "5 barg - 7 barg"), 6e5, 8e5)
    assert_values(reading("pressure", "5 kg/cm2g-7 kg/cm2g", unit=None), 5 * 98_066.5 + 1e5, 7 * 98_066.5 + 1e5)
    assert_values(reading("pressure", "5-7 bara"), 5e5, 7e5)
    assert_values(reading("gradient", "0.4-0.5 bar/100m"), 400.0, 500.0)
    assert_values(reading("temperature", "500 oR - 700 oR"), 500 / 1.8, 700 / 1.8)
    assert_refused(reading("pressure", "5 psig to 7"), "5 psig to 7", "psig beside one of its two numbers")
    assert_refused(reading("pressure", "10 / 50 psig"), "10 / 50 psig", "one of its two numbers")
    assert reading("pressure", "5-7", unit=None).reason == "no unit"


def test_equal_ends_are_one_value() -> None:
    assert_values(reading("temperature", "50-50"), 323.15)
    assert_values(reading("temperature", "50\u00b10"), 323.15)


DOUBTFUL = [
    ("7-5", "is it 5 to 7?"), ("7 to 5", "is it 5 to 7?"), ("-172-47", "-172 to 47 or as -172 to -47"),
    ("5-7-9", "more than two values"), ("5/6/7", "more than two values"), ("5 to 7 to 9", "more than two values"),
    ("1/2", "0.5 or as the two values 1 and 2"), ("3/4", "0.75"), ("3/8 \u00b0C", "0.375"), ("5 7", "two numbers side by side"),
    ("[3.967, 76.39]", "list of numbers"), ("3.967, 76.39", "list of numbers"), ("5; 7", "list of numbers"),
    ("5 x 7", "product"), ("2*50", "product"), ("3:4", "two numbers"), ("5+7", "sum"), ("5-", "behind the number"),
    ("100 psig / 150 \u00b0F", "two quantities"), ("100 psig, 150 \u00b0F", "two quantities"),
    ("40 0C", "40 \u00b0C with the degree sign lost"), ("60 0F", "60 \u00b0F"), ("!123.7", "minus sign may have been lost"),
    ("(50)", "brackets"), ("10 (50)", "a note or a second value"), ("5 (7)", "a note or a second value"),
    ("50 (122)", ""), ("10\u2075", "power of ten"), ("2.98x106", "times 10 to the power 6 or as times 106"),
    ("50 \u00b0C \u00b1 5 \u00b0F", "two units"), ("50 \u00b1 -5", "negative spread"), ("50%", "not a unit"),
    ("60 barg", "not a unit of temperature"), ("\u200b50", "invisible character (U+200B)"), ("5\u202e0", "U+202E"),
    ("5\n7", "two numbers side by side"), ("0 500", "more than one number"), ("5e", "'e'"), ("5 -", ""),
]  # fmt: skip


@pytest.mark.parametrize(("cell", "words"), DOUBTFUL)
def test_doubtful_cell_is_a_question(cell: str, words: str) -> None:
    found = reading("temperature", cell)
    assert found.gap is Gap.REFUSED
    assert words in found.reason
    assert math.isnan(found.value)


@pytest.mark.parametrize("cell", ["1.1/2", '1.1/2"', "3/8", '3/8"', "1 1/2", "1-1/2", '1-1/2"', "5/2", "10/16 in"])
def test_fraction_of_an_inch_is_no_range(cell: str) -> None:
    assert reading("elevation", cell).gap is Gap.REFUSED


LIMITS = [
    "<50", "< 50", "<= 50", "=<50", "\u226450", "\u2265 50", ">50", ">= 50", "max 50", "max. 50", "MAX50", "50 max.",
    "50 (max)", "50max", "min 50", "50 min.", "380+", "50 +", "up to 50", "not more than 50", "at least 50",
    "50 or more", "50 & above", "over 50", "below 50", "<50 \u00b0C", "max 50 \u00b0C", "50 \u00b0C max", "max 50 (Note 2)",
]  # fmt: skip
ABOUT = ["~50", "\u224850", "ca. 50", "ca 50", "c. 50", "circa 50", "approx. 50", "approx 50", "50 approx.", "abt 50",
         "abt. 50", "about 50", "50 (approx)", "~50 \u00b0C", "50 est."]  # fmt: skip


@pytest.mark.parametrize("cell", [*LIMITS, *ABOUT])
def test_limit_or_approximation_is_kept_but_not_used(cell: str) -> None:
    found = reading("temperature", cell)
    kind = "is an approximation" if cell in ABOUT else "is a limit"
    assert_refused(found, cell, kind, "kept but not used", "K)")
    record = record_of(cell, context("temperature"))
    number = 380.0 if "380" in cell else 50.0
    assert record.numbers == (number,)
    assert record.values == pytest.approx((number + 273.15,))
    assert record.unit in ("degC", "\u00b0C")
    assert record.remark == found.reason


def test_minute_is_no_minimum() -> None:
    assert_values(reading("closure time", "5 min"), 300.0)
    assert_values(reading("volume flow", "60 m3/min"), 1.0)
    assert_refused(reading("closure time", "max 5 min"), "max 5 min", "limit")


MARKED = ["50*", "50 *", "50**", "50\u2020", "50 (Note 2)", "50(note 2)", "50 [Note 12]", "50 (Notes 1, 2)", "50 note 3",
          "50 (2)", "50\u00b9", "50 \u00b9", "50\u00b9\u00b2", "50* \u00b0C", "50 \u00b0C*", "50\u00b9 \u00b0C", "50 (see note 4)"]  # fmt: skip


@pytest.mark.parametrize("cell", MARKED)
def test_footnote_mark_is_read_and_told(cell: str) -> None:
    found = reading("temperature", cell)
    assert_values(found, 323.15)
    assert found.note.startswith("footnote mark '")
    assert record_of(cell, context("temperature")).remark == found.note


def test_footnote_digit_is_never_glued_to_the_number() -> None:
    assert_values(reading("flow", "50\u00b9"), 50 / 3600)
    assert_values(reading("volume flow", "50 m\u00b3/h"), 50 / 3600)
    assert reading("volume flow", "50 m\u00b3/h").note == ""


DESIGN = [
    ("design pressure", "3.5/FV", 4.5e5, 0.0), ("design pressure", "FV/10", 1.1e6, 0.0),
    ("design pressure", "10 / FV", 1.1e6, 0.0), ("design pressure", "10 / F.V.", 1.1e6, 0.0),
    ("design pressure", "10 barg & full vacuum", 1.1e6, 0.0), ("design pressure", "FV to 10", 1.1e6, 0.0),
    ("design pressure", "10/-0.5", 1.1e6, 0.5e5), ("design pressure", "-1 to 10", 1.1e6, 0.0),
    ("design temperature", "-29/60", 333.15, 244.15), ("design temperature", "-29 to 60", 333.15, 244.15),
    ("design temperature", "60/-29", 333.15, 244.15), ("design temperature", "AMB", 313.15, 263.15),
    ("design pressure", "3.5 (FV)", 4.5e5, 0.0), ("design pressure", "10/FV*", 1.1e6, 0.0), ("design pressure", "0/10", 1.1e6, 1e5),
    ("design pressure", "10/FV (Note 1)", 1.1e6, 0.0), ("design temperature", "AMB*", 313.15, 263.15),
    ("design temperature", "20 to 80", 353.15, 293.15),
]  # fmt: skip


@pytest.mark.parametrize(("column", "cell", "value", "lowest"), DESIGN)
def test_two_design_values(column: str, cell: str, value: float, lowest: float) -> None:
    found = reading(column, cell)
    assert_values(found, value)
    assert found.lowest == pytest.approx(lowest, abs=1e-9)
    assert record_of(cell, context(column)).values == pytest.approx((lowest, value), abs=1e-9)


def test_full_vacuum_alone_is_the_lowest_design_pressure() -> None:
    found = reading("design pressure", "FV")
    assert_refused(found, "FV", "write the design pressure too")
    assert found.lowest == 0.0
    for cell in ("FV", "10/FV"):
        operating = reading("pressure", cell)
        assert_refused(operating, cell, "full vacuum", "a design condition")
        assert math.isnan(operating.lowest)
    assert_refused(reading("design pressure", "x/FV"), "x/FV")
    assert_refused(reading("design pressure", "10/-2"), "10/-2", "impossible lower value")
    assert_refused(reading("lowest design temperature", "-29/60"), "-29/60", "lowest alone")


def test_plain_number_has_a_record() -> None:
    record = record_of("4.5", context("pressure"))
    assert (record.text, record.numbers, record.unit) == ("4.5", (4.5,), "barg")
    assert record.values == pytest.approx((550_000.0,))
    assert record.remark == ""
    assert record_of("HOLD", context("pressure")) == ("HOLD", (), "", (), "")
    bare = record_of("4.5", context("pressure", unit=None))
    assert (bare.numbers, bare.values, bare.remark) == ((4.5,), (), "no unit")
    assert record_of("5 barg", context("pressure", unit=read_unit("bara", "pressure"))).unit == "barg"


@pytest.mark.parametrize(
    ("column", "cell"),
    [
        ("design pressure", "5-10"),
        ("design pressure", "5 to 10"),
        ("design pressure", "10/5"),
        ("design temperature", "30 to 80"),
        ("design temperature", "50\u00b15"),
    ],
)
def test_two_ordinary_design_values_are_a_question(column: str, cell: str) -> None:
    found = reading(column, cell)
    assert_refused(found, cell, "states two values for the design", "with a lowest of", "in one case and")
    assert math.isnan(found.lowest)
    assert len(record_of(cell, context(column)).values) == 2


@pytest.mark.parametrize("cell", ["AMB/60", "60/AMB", "Amb. to 60"])
def test_ambient_beside_a_number_says_what_to_write(cell: str) -> None:
    assert_refused(reading("design temperature", cell), cell, "'-10/60' may be meant")
    assert_refused(reading("design temperature", cell, ambient=None), cell, "write both as numbers")


@pytest.mark.parametrize(
    ("cell", "words"),
    [
        ("40/50/60", "three values"),
        ("10/11/12", "date"),
        ("-0.5-2", "-0.5 to 2 or as -2 to -0.5"),
        ("1e-400", "too small"),
        ("10^-330", "too small"),
        ("10/FV (1)", "cannot be read"),
    ],
)
def test_sentences_of_odd_numbers(cell: str, words: str) -> None:
    assert_refused(reading("design pressure", cell), cell, words)


@pytest.mark.parametrize(
    ("header", "cell"),
    [
        ("Allow. dP [bar]", "9999"),
        ("Pressure drop [bar]", "9999"),
        ("Pressure gradient [bar/100m]", "9999.9"),
        ("Velocity [m/s]", "9999"),
        ("Velocity limit [m/s]", "99999"),
        ("Static head [mm]", "9999"),
        ("NPSH required [mm]", "9999"),
    ],
)
def test_nines_are_a_stand_in_in_differences_velocities_and_heads(tmp_path: Path, header: str, cell: str) -> None:
    listed = read(tmp_path, one_column(header, cell, f"{cell} ", "1"))
    sentences = list(listed.refusals.values())
    assert len(sentences) == 2
    assert all("stand-in" in sentence for sentence in sentences)


def test_nines_are_a_flow_and_a_length(tmp_path: Path) -> None:
    for header in ("Flow [kg/h]", "Length [m]"):
        assert not read(tmp_path, one_column(header, "9999")).refusals


@pytest.mark.parametrize("header", ["SG", "SG [-]", "SG (-)", "Specific Gravity [-]"])
def test_a_dash_for_the_unit_of_a_specific_gravity(tmp_path: Path, header: str) -> None:
    listed = read(tmp_path, f"Line No,Phase,{header},P [barg]\nP-1,L,0.85,5\n")
    assert listed.number("density")[0] == pytest.approx(849.1636)
    assert "density" in str(read(tmp_path, "Line No,Phase,Density [-],P [barg]\nP-1,L,0.85,5\n").refusals)


@pytest.mark.parametrize(
    ("unit", "dimension", "scale", "reference"),
    [
        ("mmwg", "pressure", 9.80665, "gauge"),
        ("mmwc", "pressure difference", 9.80665, ""),
        ("mmh2o", "pressure difference", 9.80665, ""),
        ("mmh2og", "pressure", 9.80665, "gauge"),
        ("mmwg/m", "pressure gradient", 9.80665, ""),
    ],
)
def test_water_columns_in_small_letters(unit: str, dimension: str, scale: float, reference: str) -> None:
    found = read_unit(unit, dimension)
    assert (found.scale, found.reference) == (pytest.approx(scale), reference)
