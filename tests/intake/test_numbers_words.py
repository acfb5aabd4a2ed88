"""Words, marks and traces of spreadsheets where a number should be, by column."""

from __future__ import annotations

import numpy as np
import pytest
from number_columns import AMBIENT, ATMOSPHERE, assert_refused, assert_values, context, reading

from checker.fields import field_named
from checker.intake.doubts import doubt_of, stand_ins
from checker.intake.number_cells import read_number_cell, record_of
from checker.intake.placeholders import OPEN_WORDS, ditto, holds, placeholder
from checker.intake.spreadsheet_traces import date_originals
from checker.model import Gap
from checker.units import read_unit

GAPS = [
    ("", Gap.BLANK), ("  ", Gap.BLANK), ("-", Gap.BLANK), ("--", Gap.BLANK), ("---", Gap.BLANK), ("\u2014", Gap.BLANK),
    ("_", Gap.BLANK), ("HOLD", Gap.HOLD), ("HOLD 12.5", Gap.HOLD), ("12.5 HOLD", Gap.HOLD), ("12.5HOLD", Gap.HOLD),
    ("12.5 (HOLD 4)", Gap.HOLD), ("TBC", Gap.HOLD), ("T.B.C.", Gap.HOLD), ("TBF", Gap.HOLD), ("VTA", Gap.HOLD),
    ("V.T.A.", Gap.HOLD), ("VTS", Gap.HOLD), ("LATER", Gap.HOLD), ("BY VENDOR", Gap.HOLD), ("By Licensor", Gap.HOLD),
    ("Vendor to confirm", Gap.HOLD), ("to follow", Gap.HOLD), ("12.5 by vendor", Gap.HOLD), ("12.5 (VTA)", Gap.HOLD),
    ("To be confirmed", Gap.HOLD), ("N/A", Gap.NOT_APPLICABLE), ("n.a.", Gap.NOT_APPLICABLE),
    ("NONE", Gap.NOT_APPLICABLE), ("Nil", Gap.NOT_APPLICABLE), ("N/R", Gap.NOT_APPLICABLE),
]  # fmt: skip


@pytest.mark.parametrize(("cell", "gap"), GAPS)
@pytest.mark.parametrize("column", ["pressure", "temperature", "flow"])
def test_gap(column: str, cell: str, gap: Gap) -> None:
    found = reading(column, cell)
    assert found.gap is gap
    assert found.reason == ""
    assert record_of(cell, context(column)) == (cell, (), "", (), "")


def test_dash_is_a_gap_and_a_minus_is_not() -> None:
    assert reading("temperature", "-").gap is Gap.BLANK
    assert_values(reading("temperature", "-45"), 228.15)


def test_none_is_a_value_of_the_insulation() -> None:
    assert placeholder("NONE", "insulation") is Gap.GIVEN
    assert placeholder("NONE", "pressure") is Gap.NOT_APPLICABLE


@pytest.mark.parametrize("text", [cell for cell, gap in GAPS if gap is Gap.HOLD])
def test_every_open_item_holds_one_of_the_open_words(text: str) -> None:
    assert any(word in text.upper() for word in OPEN_WORDS)


def test_tags_are_no_open_items() -> None:
    assert not any(map(holds, ("VTA-101", "HOLD-UP DRUM", "THOLD", "STBC", "LATERAL", "Vendor package V-100")))


@pytest.mark.parametrize("word", ["ATM", "atm", "Atmos.", "ATMOSPHERIC"])
def test_atmosphere_is_0_barg(word: str) -> None:
    assert_values(reading("pressure", word), ATMOSPHERE)
    assert record_of(word, context("pressure"))[1:4] == ((0.0,), "barg", (ATMOSPHERE,))
    assert_refused(reading("temperature", word), word, "not a number")


@pytest.mark.parametrize("word", ["AMB", "Ambient", "AMB.", "ambient temp"])
def test_ambient_is_the_range_of_the_site(word: str) -> None:
    assert_values(reading("temperature", word), *AMBIENT)
    assert_values(reading("lowest design temperature", word), AMBIENT[0])
    asked = reading("temperature", word, ambient=None)
    assert_refused(asked, word, "ambient_minimum", "[site]")
    assert_refused(reading("pressure", word), word, "not a number")


@pytest.mark.parametrize("word", ["NNF", "no flow", "Normally no flow"])
def test_no_flow(word: str) -> None:
    assert_values(reading("flow", word), 0.0)
    assert_values(reading("volume flow", word), 0.0)
    assert_refused(reading("pressure", word), word, "nothing flows")


REFUSED = [
    ("#N/A", "error value of the spreadsheet"), ("#REF!", "error value"), ("#DIV/0!", "error value"),
    ("#VALUE!", "error value"), ("#NAME?", "error value"), ("#NUM!", "error value"), ("1.#IND", "error value"),
    ("1.#INF", "error value"), ("-1.#IND00", "error value"), ("Err:502", "error value"), ("#####", "too narrow"),
    ("TRUE", "yes or a no"), ("No", "yes or a no"), ("12:30", "time of day"), ("X", "a mark"), ("?", "a mark"),
    ("??", "a mark"), ("*", "a mark"), ("**", "a mark"), (".", "a mark"), ("\u221e", "infinity"), ('"', "cell above"),
    ("\u201d", "cell above"), ("''", "cell above"), ("\u3003", "cell above"), ("DITTO", "cell above"),
    ("-do-", "cell above"), ("do.", "cell above"), ("same as above", "cell above"), ("\u2193", "cell above"),
    ("Saturated", "a state"), ("Sat.", "a state"), ("see note 3", "points elsewhere"), ("Note 3", "points elsewhere"),
    ("REFER P&ID 1002", "points elsewhere"), ("as per HMB", "points elsewhere"), ("=1+1", "like a formula"),
    ("=D5", "like a formula"), ("@SUM(A1)", "like a formula"), ("null", "no value"), ("Undefined", "no value"),
    ("nan", "not a number"), ("NaN", "not a number"), ("-inf", "not a number"), ("Infinity", "not a number"),
    ("1_000", "'_000'"), ("0x1F", ""), ("0o17", "'o17'"), ("\u0663", "none of the digits 0 to 9"), ("\u2163", "digits 0 to 9"),
    ("\u00bd", "digits 0 to 9"), ("1\u0663", ""), ("\uff15\uff10", "digits 0 to 9"), ("twelve", "not a number"), ("1e400", "finite"),
    ("1e999999999", ""), ("9" * 61, "too long"), ("1/0/0", ""), ("__import__('os')", "not a number"), ("m**m", "not a number"),
    ("1" * 5000, "too long"), ("1.2.3", "not one number"), ("1,2,3", "not one number"), ("e5", "not a number"),
]  # fmt: skip


@pytest.mark.parametrize(("cell", "words"), REFUSED)
def test_what_is_no_number_is_refused_with_what_it_is(cell: str, words: str) -> None:
    found = reading("temperature", cell)
    assert found.gap is Gap.REFUSED
    assert words in found.reason
    assert len(found.reason) < 220


DATES = [
    ("2-Jan", ("1-2", "2-1", "1/2", "1-1/2")), ("02-Jan-2026", ("1-2", "2-1", "1/2", "1-1/2")),
    ("2026-01-02", ("1-2", "2-1", "1/2", "1-1/2")), ("2026-01-02 00:00:00", ("1-2", "2-1", "1/2", "1-1/2")),
    ("5-Jul", ("7-5", "5-7")), ("Jul-05", ("7-5", "5-7")), ("5 July 2026", ("7-5", "5-7")), ("7-May", ("5-7", "7-5")),
    ("4-Mar", ("3-4", "4-3", "3/4")), ("4-Jan", ("1-4", "4-1", "1/4", "1-1/4")), ("05/07/2026", ("7-5", "5-7")),
    ("5.7.2026", ("7-5", "5-7")), ("5-May", ("5-5",)),
]  # fmt: skip


@pytest.mark.parametrize(("cell", "originals"), DATES)
def test_date_names_its_likely_originals(cell: str, originals: tuple[str, ...]) -> None:
    assert date_originals(cell) == originals
    assert_refused(reading("pressure", cell), cell, "is a date", "Write the original", *originals)


def test_no_date() -> None:
    for text in ("5-7", "5/7", "1.234.567", "2.5", "may", "2-J", "mar", "10.5", "1-1/2", "Mars-5", "5 sec"):
        assert date_originals(text) == ()


@pytest.mark.parametrize("cell", ["9999", "99999", "999999", "9999.9", "-9999", "9,999,999", "9999 \u00b0C", "9 999"])
def test_nines_are_a_stand_in_for_unknown(cell: str) -> None:
    found = reading("temperature", cell)
    assert_refused(found, cell, "stand-in for an unknown value")
    for column in ("pressure", "density", "viscosity", "molar mass", "design temperature"):
        assert "stand-in" in reading(column, "9999").reason


def test_nines_that_may_be_values() -> None:
    """Water has 999.9 kg/m3 at 8 degrees Celsius (common tables), and flows of 9999 kg/h exist."""
    assert_values(reading("density", "999.9"), 999.9)
    assert_values(reading("temperature", "99.99"), 99.99 + 273.15)
    assert_values(reading("flow", "9999"), 9999 / 3600)
    assert_refused(reading("elevation", "-9999"), "-9999", "stand-in")


def test_stand_ins_of_many_numbers() -> None:
    numbers = np.array([9999.0, np.nan, 999.9, -9999.0, 99999.0, 9998.0, 9999.9, 0.0])
    expected = [True, False, False, True, True, False, True, False]
    assert stand_ins(numbers, field_named("density")).tolist() == expected
    assert stand_ins(numbers, field_named("flow_mass")).tolist() == [n == -9999.0 for n in numbers]


DOUBTS = [
    ("temperature", "degC", "-46100", "was it -46 to 100?"), ("temperature", "degC", "101200", "was it 101 to 200?"),
    ("temperature", "degC", "-17247", "was it -17 to 247 or -172 to 47?"), ("temperature", "degC", "9999", "stand-in"),
    ("density", "kg/m3", "0", "stand-in"), ("density", "kg/m3", "0.0", "stand-in"), ("pressure", "bara", "0", "stand-in"),
    ("temperature", "degC", "-46100.5", ""), ("temperature", "degC", "1e7", ""), ("temperature", "degC", "5000", ""),
    ("temperature", "degC", "1" * 400, ""), ("temperature", "degC", "", ""),
]  # fmt: skip


@pytest.mark.parametrize(("name", "spelling", "cell", "words"), DOUBTS)
def test_doubt_about_an_impossible_number(name: str, spelling: str, cell: str, words: str) -> None:
    field = field_named(name)
    doubt = doubt_of(cell, field, read_unit(spelling, field.dimension), ATMOSPHERE)
    assert words in doubt
    assert bool(words) == bool(doubt)
    assert not doubt or doubt.startswith(" ")


def test_ditto() -> None:
    assert all(map(ditto, ('"', "''", "ditto", "-do-", "Same as above", "\u3003")))
    assert not any(map(ditto, ("", "-", '6"', "dot", "same fluid as P-101", "do not use")))


def test_column_without_a_unit_still_reads_words_and_cells_with_units() -> None:
    bare = context("pressure", unit=None)
    assert read_number_cell("12", bare).reason is bare.refusal
    assert read_number_cell("ATM", bare).value == ATMOSPHERE
    assert read_number_cell("2 bara", bare).value == 200_000.0
    assert "limit" in read_number_cell("<5", bare).reason
