"""Any number in any form and unit reads back; any text at all gives a value, a gap or a sentence, never a fault."""

from __future__ import annotations

import csv
import math
import random
from dataclasses import replace
from decimal import Decimal
from functools import cache
from pathlib import Path

import numpy as np
import pytest
from hypothesis import example, given, settings
from hypothesis import strategies as st

import checker.units
from checker.fields import all_fields, field_named
from checker.intake.decimal_marks import DECIMAL, THOUSANDS, Marks
from checker.intake.doubts import is_stand_in
from checker.intake.number_cells import LONGEST_NUMBER, CellReading, NumberContext, read_number_cell, record_of
from checker.intake.ranges import LOWEST_DESIGN
from checker.intake.unit_words import unit_in_cell
from checker.model import Gap
from checker.units import Unit, read_unit, to_si

ATMOSPHERE = 98_000.0
AMBIENT = (263.15, 313.15)
FIELD_OF = {field.dimension: field for field in all_fields() if field.kind == "number"}
FIELD_OF |= {"pressure": field_named("pressure"), "temperature": field_named("temperature")}
SUPERSCRIPT = str.maketrans("0123456789-", "\u2070\u00b9\u00b2\u00b3\u2074\u2075\u2076\u2077\u2078\u2079\u207b")
POINTS, COMMAS, THOUSAND_COMMAS = Marks("", DECIMAL), Marks(DECIMAL, ""), Marks(THOUSANDS, DECIMAL)


@cache
def spellings(dimension: str) -> tuple[tuple[str, Unit], ...]:
    """Return every spelling of the table of units that a cell of this dimension may carry, with its unit."""
    with (Path(checker.units.__file__).parent / "tables" / "units.csv").open(encoding="utf-8", newline="") as handle:
        written = [row["spelling"] for row in csv.DictReader(handle) if row["dimension"] == dimension]
    pairs = ((spelling, unit_in_cell(spelling, dimension)) for spelling in written if spelling not in ("", "-"))
    return tuple((spelling, unit) for spelling, unit in pairs if not isinstance(unit, str))


def grouped(digits: str, mark: str, *, indian: bool = False) -> str:
    """Return a whole number with a mark between its thousands, or between its lakhs."""
    head, tail = digits[:-3], digits[-3:]
    size = 2 if indian else 3
    groups = [head[max(0, end - size) : end] for end in range(len(head), 0, -size)][::-1]
    return mark.join([*groups, tail])


def parted(number: str, mark: str, point: str = ".", *, indian: bool = False) -> str:
    """Return a number in decimals with marks between its thousands."""
    sign, body = ("-", number[1:]) if number.startswith("-") else ("", number)
    whole, _, decimals = body.partition(".")
    return f"{sign}{grouped(whole, mark, indian=indian)}{point if decimals else ''}{decimals}"


def decimal(number: float) -> str:
    """Return a number in decimals, without an exponent."""
    return format(Decimal(repr(number)), "f")


def mantissa(number: float) -> tuple[str, int]:
    """Return the shortest mantissa and exponent of a number."""
    text, _, exponent = f"{Decimal(repr(number)):E}".partition("E")
    return text, int(exponent)


def powers(number: float) -> list[tuple[str, Marks, str]]:
    """Return a number in every scientific spelling, with the marks and the delimiter of its list."""
    text, power = mantissa(number)
    signed = f"{power:+d}"
    forms = [
        f"{text}E{power}", f"{text}e{signed}", f"{text} E{signed}", f"{text}x10{signed}", f"{text}x10^{power}",
        f"{text} x 10^{power}", f"{text}\u00d710{str(power).translate(SUPERSCRIPT)}", f"{text}*10^{power}",
        f"{text} \u00d7 10{str(power).translate(SUPERSCRIPT)}", f"{text}\u00b710^{power}", f"{text}x10**{power}",
    ]  # fmt: skip
    return [(form, POINTS, ",") for form in forms] + [(form.replace(".", ","), COMMAS, ";") for form in forms]


def decimals(number: float) -> list[tuple[str, Marks, str]]:
    """Return a number in every spelling without an exponent."""
    text = decimal(number)
    forms = [(text, POINTS, ","), (f" {text} ", POINTS, ","), (text.replace("-", "\u2212"), POINTS, ",")]
    forms += [(text.replace(".", ","), COMMAS, delimiter) for delimiter in (",", ";", "\t", "")]
    forms += [("+" + text, POINTS, ",")] if not text.startswith("-") else []
    if 1000.0 <= abs(number) < 1e12:
        blanks = (" ", "\u00a0", "\u202f", "\u2009", "'", "\u2019")
        forms += [(parted(text, blank), POINTS, ",") for blank in blanks]
        forms += [(parted(text, blank, ","), COMMAS, ";") for blank in blanks]
        forms += [(parted(text, ","), THOUSAND_COMMAS, ","), (parted(text, ",", indian=True), THOUSAND_COMMAS, ";")]
        forms += [(parted(text, ".", ","), Marks(DECIMAL, THOUSANDS), ";")]
    return forms


def context_of(dimension: str, unit: Unit | None, marks: Marks, delimiter: str) -> NumberContext:
    """Return a column of a dimension."""
    field = FIELD_OF[dimension]
    return NumberContext(field, unit, "no unit", ATMOSPHERE, delimiter, delimiter == ";", AMBIENT, marks)


@st.composite
def units(draw: st.DrawFn) -> tuple[str, str, Unit]:
    """Draw a dimension and one of its spellings."""
    dimension = draw(st.sampled_from(sorted(name for name in FIELD_OF if spellings(name))))
    return (dimension, *draw(st.sampled_from(spellings(dimension))))


def assert_one(found: CellReading, text: str, number: float, unit: Unit, dimension: str) -> None:
    """Assert that a cell gave the SI value of a number, or is refused for the one good reason."""
    with np.errstate(all="ignore"):
        expected = float(to_si(number, unit, atmosphere=ATMOSPHERE))
    if is_stand_in(number, FIELD_OF[dimension]) or not math.isfinite(expected):
        assert found.gap is Gap.REFUSED, text
    elif len(text.strip()) > LONGEST_NUMBER:
        assert "too long" in found.reason
    else:
        assert found.gap is Gap.GIVEN, (text, found.reason)
        assert found.value == pytest.approx(expected, rel=1e-12, abs=0.0), text
        assert math.isnan(found.high)


def _no_nothing(number: float) -> bool:
    """Return whether a number is zero or large enough to be one: what is below 1e-200 is refused."""
    return number == 0.0 or abs(number) > 1e-199


WIDE = st.floats(-1e250, 1e250, allow_subnormal=False).filter(_no_nothing) | st.integers(-(10**6), 10**6).map(float)


@settings(max_examples=600, deadline=None)
@given(st.data(), units(), WIDE, st.booleans(), st.sampled_from(["", " ", "  "]))
def test_any_number_in_any_form_and_unit_reads_back(
    data: st.DataObject, drawn: tuple[str, str, Unit], number: float, own_unit: bool, gap: str
) -> None:
    dimension, spelling, unit = drawn
    forms = powers(number) + (decimals(number) if abs(number) < 1e30 else [])
    text, marks, delimiter = data.draw(st.sampled_from(forms), label="form")
    context = context_of(dimension, None if own_unit else unit, marks, delimiter)
    cell = f"{text}{gap if spelling[0].isalpha() else ' '}{spelling}" if own_unit else text
    assert_one(read_number_cell(cell, context), cell, number, unit, dimension)


BETWEEN = (
    " to ", " - ", "-", " \u2013 ", "~", " ~ ", "..", " .. ", "\u2026", " thru ", " THROUGH ", "/+", " / ", " & ",
)  # fmt: skip
ENDS = st.integers(-(10**5), 10**5).map(lambda number: number / 100) | st.integers(0, 500).map(float)


RANKINE = ("temperature", "oR", read_unit("oR", "temperature"))


@settings(max_examples=400, deadline=None)
@example(RANKINE, 0.0, 0.01, " - ", "both")
@example(RANKINE, -0.01, 0.0, " - ", "both")
@given(units(), ENDS, ENDS, st.sampled_from(BETWEEN), st.sampled_from(["column", "last", "both"]))
def test_any_range_keeps_both_ends(drawn: tuple[str, str, Unit], one: float, two: float, mark: str, at: str) -> None:
    dimension, spelling, unit = drawn
    low, high = sorted((one, two))
    first, second = decimal(low), decimal(abs(high) if mark == "/+" else high)
    own = "" if at == "column" else f" {spelling}"
    cell = f"{first}{own if at == 'both' else ''}{mark}{second}{own}"
    found = read_number_cell(cell, context_of(dimension, unit if at == "column" else None, POINTS, ","))
    ends = sorted(to_si(np.array([low, abs(high) if mark == "/+" else high]), unit, atmosphere=ATMOSPHERE).tolist())
    if low < 0.0 and mark.strip() in ("-", "\u2013") and high >= 0.0:
        assert "lost its range mark" in found.reason
    elif found.gap is Gap.REFUSED:
        reasons = ("downwards", "stand-in", "finite", "fraction")
        assert any(words in found.reason for words in reasons), (cell, found.reason)
        assert mark == "/+" or "downwards" not in found.reason
    else:
        assert found.value == pytest.approx(ends[0], rel=1e-12, abs=0.0), cell
        assert (found.high if ends[0] != ends[1] else ends[1]) == pytest.approx(ends[1], rel=1e-12, abs=0.0), cell


@settings(max_examples=200, deadline=None)
@given(
    units(), ENDS, st.sampled_from(["<", "> ", "<=", "\u2265", "max ", "max. ", "~", "ca. ", "approx. ", "abt "]),
    st.sampled_from(["", "*", " (Note 2)", "\u00b9"]),
)  # fmt: skip
def test_any_limit_is_kept_but_not_used(drawn: tuple[str, str, Unit], number: float, before: str, mark: str) -> None:
    dimension, spelling, unit = drawn
    cell = f"{before}{decimal(number)}{mark} {spelling}"
    context = context_of(dimension, unit, POINTS, ",")
    found, record = read_number_cell(cell, context), record_of(cell, context)
    with np.errstate(all="ignore"):
        expected = float(to_si(number, unit, atmosphere=ATMOSPHERE))
    assert found.gap is Gap.REFUSED
    if math.isfinite(expected) and "power of ten" not in found.reason:
        assert record.numbers == (number,), cell
        assert record.values == pytest.approx((expected,), rel=1e-12, abs=0.0)
        assert "kept but not used" in found.reason


def assert_sound(text: str, context: NumberContext) -> CellReading:
    """Assert what must hold of the reading of any text whatever."""
    found, record = read_number_cell(text, context), record_of(text, context)
    given_ = found.gap is Gap.GIVEN
    assert math.isfinite(found.value) == given_
    assert bool(found.reason) == (found.gap is Gap.REFUSED)
    assert not found.note or given_
    assert math.isnan(found.high) or (given_ and found.high > found.value and context.field.name not in LOWEST_DESIGN)
    assert math.isnan(found.lowest) or context.field.name in LOWEST_DESIGN
    assert len(found.reason) < 320
    assert found.reason.isprintable()
    assert record.text == text
    assert all(map(math.isfinite, (*record.numbers, *record.values)))
    assert len(record.values) in (0, len(record.numbers))
    assert len(record.numbers) <= 2
    if given_:
        ends = {found.value, found.high, found.lowest} - {math.nan}
        assert {value for value in record.values} <= ends | {found.value}
        assert found.value in record.values
    return found


def _column(name: str, spelling: str, delimiter: str, marks: Marks | None) -> NumberContext:
    field = field_named(name)
    unit = unit_in_cell(spelling, field.dimension)
    assert not isinstance(unit, str)
    return NumberContext(field, unit, "no unit", ATMOSPHERE, delimiter, delimiter == ";", AMBIENT, marks)


COLUMNS = (
    _column("temperature", "degC", ",", None), _column("pressure", "barg", ";", None),
    _column("pressure_design", "bara", ",", COMMAS), _column("temperature_design", "degF", "\t", Marks("", "")),
    _column("flow_mass", "kg/h", ";", Marks(DECIMAL, THOUSANDS)), _column("viscosity", "cSt", "", THOUSAND_COMMAS),
    replace(_column("density", "kg/m3", ",", None), unit=None), _column("closure_time", "s", ",", None),
)  # fmt: skip
TOKENS = (
    "0", "5", "7", "10", "50", "1", "234", "100", "9999", "1e5", "E+09", "x10-6", "\u00d710\u207b\u2076", ".", ",", "'",
    " ", "\u00a0", "\u202f", "-", "\u2013", "\u2212", "+", "/", "~", "..", "to", " to ", " / ", "\u00b1", "&", ";", "<",
    "<=", "\u2265", ">", "max ", " max.", "ca. ", "~", "*", "**", "\u00b9", "\u00b2", "(Note 2)", " (2)", "[", "]", "(",
    ")", "FV", "/FV", "ATM", "AMB", "NNF", "HOLD", "TBC", "N/A", "VTA", "#N/A", "1.#IND", "-Jan", "2-Jan", "2026-01-02",
    " barg", "bara", " \u00b0C", "0C", "psig", " kg/cm2g", "m3/h", "cSt", "%", '"', "DITTO", "!", "?", "=", "_", "0x1F",
    "\u0663", "\u00bd", "\u221e", "\x1b[31m", "\0", "\u202e", "\u200b", "\n", "nan", "inf", "1_000", "Saturated",
    "see note",
)  # fmt: skip
MUTATED = st.lists(st.sampled_from(TOKENS), max_size=7).map("".join)


@settings(max_examples=700, deadline=None)
@given(st.text(max_size=90) | MUTATED | MUTATED.map(lambda text: text * 3), st.sampled_from(COLUMNS))
@example("9" * 5000, COLUMNS[0])
@example("1e999999999", COLUMNS[0])
@example("1" + " 000" * 30, COLUMNS[0])
@example("(" * 30_000, COLUMNS[0])
def test_any_text_gives_a_number_a_gap_or_a_sentence(text: str, context: NumberContext) -> None:
    found = assert_sound(text, context)
    if found.gap is Gap.GIVEN and not any("0" <= sign <= "9" for sign in text):
        assert any(word in text.upper() for word in ("ATM", "AMB", "NNF", "NO FLOW")), text


#: Each repeats what a pattern repeats, so that one that tries every way of parting it would not end.
BACKTRACKING = (
    "1" * 60, "1," * 30, "1." * 30, "1 " * 30, "1'" * 30, "1 111" * 12, " " * 59 + "x", "-" * 60, "1-" * 30, "1~" * 30,
    "max " * 15, "<" * 60, "* " * 30, "(1)" * 20, "note 1" * 10, "1e" * 30, "x10" * 20, "1x10-" * 12, "FV/" * 20,
    "to " * 20, "a/" * 30, "\u00b9" * 60, "1\u00b9" * 30, "5 .. " * 12, "5/" * 30, "HOLD" * 15, "by vendor " * 6,
    "#" * 60, "1:" * 30,
)  # fmt: skip


@pytest.mark.parametrize("text", BACKTRACKING)
@pytest.mark.parametrize("tail", ["", "!", " barg", "1"])
def test_no_text_keeps_a_pattern_busy(text: str, tail: str) -> None:
    for context in COLUMNS:
        assert_sound(text[: LONGEST_NUMBER - len(tail)] + tail, context)
        assert_sound(text * 600 + tail, context)


@pytest.mark.slow
def test_a_hundred_thousand_random_cells() -> None:
    """Every one ends in a value, a gap or a sentence; the seed is fixed, so that each run reads the same cells."""
    chance = random.Random(20_260_103)
    counts = dict.fromkeys(Gap, 0)
    for number in range(100_000):
        if number % 4:
            text = "".join(chance.choices(TOKENS, k=chance.randrange(1, 5)))
        else:
            text = "".join(chr(chance.randrange(1, 0x2100)) for _ in range(chance.randrange(12)))
        found = read_number_cell(text, COLUMNS[number % len(COLUMNS)])
        assert math.isfinite(found.value) == (found.gap is Gap.GIVEN)
        assert bool(found.reason) == (found.gap is Gap.REFUSED)
        counts[found.gap] += 1
    assert sum(counts.values()) == 100_000
    assert all(counts[gap] > 100 for gap in (Gap.GIVEN, Gap.BLANK, Gap.HOLD, Gap.NOT_APPLICABLE, Gap.REFUSED)), counts
