"""The parts of a number cell: a limit or an approximation, a footnote mark, and one number or two with their units."""

from __future__ import annotations

import re
from collections.abc import Iterator
from typing import NamedTuple

from checker.intake.decimal_marks import Marks
from checker.intake.not_numbers import no_number
from checker.intake.number_shapes import Head, NumberRefusedError, plain_powers, read_head
from checker.intake.unit_words import is_unit_text, unit_in_cell
from checker.units import Unit

__all__ = ["APPROXIMATION", "LIMIT", "CellParts", "read_parts", "without_marks", "without_sure_marks"]

LIMIT, APPROXIMATION = "a limit", "an approximation"
_RAISED = "\u2070\u00b9\u00b2\u00b3\u2074-\u2079"
_SYMBOLS = "*\u2020\u2021\u00a7"
_NOTE = re.compile(
    r"\s*(?:[(\[]\s?(?:see )?notes?\.? ?\d{1,2}(?: ?[,&] ?\d{1,2}){0,4}\s?[)\]]|(?<=\s)(?:see )?notes?\.? ?\d{1,2})",
    re.IGNORECASE | re.ASCII,
)
_BARE_NOTE = re.compile(r"\s?[(\[](\d{1,2})[)\]]$", re.ASCII)
_RAISED_NOTE = re.compile(rf"(?<=\d)[.]? ?[\u207d]?[{_RAISED}][{_RAISED}\u207d\u207e,]{{0,4}}|(?<=[A-Za-z])\u00b9$")
_SYMBOL_NOTE = re.compile(
    rf"(?<=\d) ?[{_SYMBOLS}]{{1,4}}(?! ?[-+.,\d{_SYMBOLS}])|(?<=[A-Za-z]) ?[{_SYMBOLS}]{{1,4}}$", re.ASCII
)
_POWER_OR_NOTE = re.compile(rf"(?<![\d.,])10 ?[{_RAISED}]")
_BEFORE = re.compile(
    r"(?:(?P<limit>[<>]=?|=[<>]|[\u2264\u2265\u2266\u2267\u2a7d\u2a7e]"
    r"|(?:no[tn]? (?:more|less|greater) than|max(?:imum)?|min(?:imum)?|up to|less than|more than|greater than"
    r"|at (?:least|most)|over|under|above|below)\.?)"
    r"|[~\u2248\u2245\u223c\u2243\uff5e]|(?:ca|c|circa|approx(?:imately)?|appr|abt|about|around|say|est|estimated)\.?)"
    r"\s?[:=]?\s?(?=[-+<>~]?\s?[.,]?\d)",
    re.IGNORECASE | re.ASCII,
)
_BEHIND = re.compile(
    r"[\s(]*(?<![A-Za-z])(?:(?P<limit>max(?:imum)?|min(?:imum)?|\+|(?:or|and|&) (?:more|less|above|below|over|under"
    r"|higher|lower))|(?:approx(?:imately)?|appr|abt|about|est(?:imated)?))[\s.)]*$",
    re.IGNORECASE | re.ASCII,
)
_BETWEEN = re.compile(
    r"\s*(\+/-|\u00b1|(?<![A-Za-z])(?:to|thru|through|until|till|and|or)(?![A-Za-z])|[&/~\u223c\uff5e\u2026;,|:x\u00d7*@-]"
    r"|\.{2,3})\s*(?=[-+]?\s?[.,]?\d)",
    re.IGNORECASE | re.ASCII,
)
_DEGREE_AS_ZERO = re.compile(r"[0oO]\s?([CF])", re.ASCII)
_FROM = re.compile(r"(?:from|between)\s(?=[-+]?\s?[.,]?\d)", re.IGNORECASE | re.ASCII)
_FRACTION = re.compile(r"([1-9]\d?)/(2|4|8|16|32|64)(?![\d.,])", re.ASCII)
_OF_AN_INCH = frozenset({2.0, 4.0, 8.0, 16.0, 32.0, 64.0})
_ORDERED = frozenset({"to", "thru", "through", "until", "till", "~", "\u223c", "\uff5e", "\u2026", "..", "...", "-"})
_EITHER = frozenset({"/", "&", "and", "or"})
_SPREAD = frozenset({"+/-", "\u00b1"})
_WHY_NOT = {
    ",": "is a list of numbers: give one value per case.", ";": "is a list of numbers: give one value per case.",
    "|": "is a list of numbers: give one value per case.", "x": "is a product: write the result.",
    "*": "is a product: write the result.", "\u00d7": "is a product: write the result.",
}  # fmt: skip


class CellParts(NamedTuple):
    """What a number cell holds.

    `numbers` is one number or the two ends of a range, `units` the unit of each (None: the cell names none), `spelling`
    the unit as the cell writes it, `kind` `LIMIT`, `APPROXIMATION` or empty, `mark` the footnote mark as written,
    `either` whether two numbers stand in no order (``50 / 60``).
    """

    numbers: tuple[float, ...]
    units: tuple[Unit | None, ...]
    spelling: str = ""
    kind: str = ""
    mark: str = ""
    either: bool = False


class _Column(NamedTuple):
    """What the column says: dimension, its unit, decimal marks and the file's delimiter."""

    dimension: str
    unit: Unit | None
    marks: Marks
    delimiter: str

    def head(self, text: str) -> Head | None:
        return read_head(text, self.marks, self.delimiter)

    def own(self, text: str) -> Unit | None:
        """Return the unit that a text names, None where it names none of this dimension."""
        unit = unit_in_cell(text, self.dimension) if text and text != "-" else ""
        return None if isinstance(unit, str) else unit


class _End(NamedTuple):
    """One number with the unit beside it, empty where there is none."""

    number: float
    spelling: str
    unit: Unit | None


def without_marks(text: str) -> tuple[str, str]:
    """Return a cell without its footnote marks, and those marks."""
    marks = []
    for shape in (_NOTE, _SYMBOL_NOTE, _RAISED_NOTE):
        match = shape.search(text)
        if match is not None and match.start() > 0 and not text[match.end() : match.end() + 1].isdigit():
            marks.append(match[0].strip())
            text = f"{text[: match.start()]}{text[match.end() :]}".strip()
    bare = _BARE_NOTE.search(text)
    if bare is not None and bare.start() > 0:
        marks.append(bare[0].strip())
        text = text[: bare.start()].strip()
    return text, " ".join(marks)


def without_sure_marks(text: str) -> tuple[str, str]:
    """Return a cell without its footnote marks, and those; as it is where one could be a number in brackets."""
    plain, mark = without_marks(text)
    return (text, "") if _BARE_NOTE.search(mark) else (plain, mark)


def _readings(text: str) -> Iterator[tuple[str, str]]:
    """Yield a cell and its kind: as it is, without the words of a limit before it, without those behind it too.

    Words behind it come last, because ``min`` and ``+`` end units and numbers as well.
    """
    yield text, ""
    kind = ""
    for _ in range(2):
        match = _BEFORE.match(text)
        if match is not None:
            kind = LIMIT if match["limit"] or kind == LIMIT else APPROXIMATION
            text = text[match.end() :]
    if kind:
        yield text, kind
    match = _BEHIND.search(text)
    if match is not None and match.start() > 0 and not text[: match.start()].rstrip().endswith(("/", " per")):
        yield text[: match.start()].strip(), LIMIT if match["limit"] or kind == LIMIT else APPROXIMATION


def _seconds(rest: str, column: _Column) -> Iterator[tuple[str, _End, str, Head]]:
    """Yield what may stand between two numbers, the first one's unit, and the second number.

    What leaves the first number a unit comes first: in ``5 oR - 7 oR`` (degrees Rankine) nothing says *or*.
    """
    places = [(match, rest[: match.start()].strip()) for match in _BETWEEN.finditer(rest)]
    for match, left in sorted(places, key=lambda place: not place[1]):
        unit = column.own(left)
        if left and unit is None:
            continue
        second = column.head(rest[match.end() :])
        if second is not None:
            yield match[1].casefold(), _End(0.0, left, unit), rest[match.end() :], second


def _refuse_rest(head: Head, column: _Column) -> NumberRefusedError:
    """Return why what stands behind a number is no unit and no second value."""
    rest = head.rest
    degree = _DEGREE_AS_ZERO.fullmatch(rest)
    if degree is not None:
        return NumberRefusedError(
            f"could be {head.number:g} \u00b0{degree[1]} with the degree sign lost, or another number: write it again."
        )
    if rest[:1].isdigit():
        return NumberRefusedError("holds two numbers side by side: give one value per case.")
    if rest[:1] == "+":
        return NumberRefusedError("is a sum, or a limit with a mark: give one value per case.")
    if any("\u2070" <= sign <= "\u209f" or sign in "\u00b9\u00b2\u00b3" for sign in rest[:1]):
        return NumberRefusedError("has a raised sign behind the number, a power or a footnote: write which.")
    for match in _BETWEEN.finditer(rest):
        if is_unit_text(rest[: match.start()].strip()):
            return NumberRefusedError("holds two quantities: give each a column of its own.")
    unit = unit_in_cell(rest, column.dimension) if rest != "-" else "'-' stands behind the number."
    return NumberRefusedError(f"cannot be read: {unit}" if isinstance(unit, str) else "is not one number.")


def _last_end(head: Head, column: _Column) -> _End:
    """Return the second of two numbers, whose rest must be its unit."""
    unit = column.own(head.rest)
    if head.rest and unit is None:
        if any(True for _ in _seconds(head.rest, column)):
            raise NumberRefusedError("holds more than two values: give one value per case.")
        if is_unit_text(head.rest):
            raise NumberRefusedError("holds two quantities: give each a column of its own.")
        raise _refuse_rest(head, column)
    return _End(head.number, head.rest, unit)


def _meaning(unit: Unit | None) -> tuple[float, float, str] | None:
    return None if unit is None else (unit.scale, unit.offset, unit.reference)


def _common_units(between: str, first: _End, second: _End, column: _Column) -> tuple[Unit | None, Unit | None]:
    """Return the unit of each of two numbers of which one or none may name it."""
    if first.unit is not None and second.unit is not None:
        if between in _SPREAD and _meaning(first.unit) != _meaning(second.unit):
            raise NumberRefusedError("names two units: write both ends in one.")
        return first.unit, second.unit
    unit = first.unit or second.unit
    differs = column.unit is not None and unit is not None and _meaning(unit) != _meaning(column.unit)
    if differs and (first.unit is not None or between in _EITHER):
        raise NumberRefusedError(
            f"names {unit.spelling if unit else ''} beside one of its two numbers only: write both."
        )
    return unit, unit


def _two(between: str, first: _End, second: _End, written: str, column: _Column) -> CellParts:
    """Return the two ends of a range or the two values of a cell."""
    low, high = first.number, second.number
    if between in _SPREAD:
        if high < 0.0:
            raise NumberRefusedError("has a negative spread: write both ends.")
        low, high = first.number - second.number, first.number + second.number
    elif between == "/" and high in _OF_AN_INCH and column.dimension in ("length", "diameter"):
        raise NumberRefusedError("may hold a fraction: write it in decimals, or two values with 'to'.")
    elif between not in _ORDERED and between not in _EITHER:
        raise NumberRefusedError(_WHY_NOT.get(between, "holds two numbers: give one value per case."))
    if between == "-" and low < 0.0 and written[:1].isdigit():
        least, most = sorted((low, -high))
        raise NumberRefusedError(
            f"has lost its range mark: it reads as {low:g} to {high:g} or as {least:g} to {most:g}. Write it with 'to'."
        )
    units = _common_units(between, first, second, column)
    spellings = dict.fromkeys(end.spelling for end in (first, second) if end.spelling)
    return CellParts((low, high), units, " and ".join(spellings), either=between in _EITHER)


def _refuse_fraction(text: str) -> None:
    """Refuse what may be a fraction or two values: ``3/4`` and ``3/8"``."""
    match = _FRACTION.match(text)
    if match is not None and int(match[1]) % 2 == 1 and int(match[1]) < int(match[2]):
        value = int(match[1]) / int(match[2])
        raise NumberRefusedError(f"reads as {value:g} or as the two values {match[1]} and {match[2]}: write which.")


def _numbers(text: str, column: _Column) -> CellParts:
    """Return the one number or the two numbers of a text that is nothing but numbers and units."""
    head = column.head(text)
    if head is None:
        raise NumberRefusedError(no_number(text))
    unit = column.own(head.rest)
    if not head.rest or unit is not None:
        return CellParts((head.number,), (unit,), head.rest)
    _refuse_fraction(text)
    for between, first, written, second in _seconds(head.rest, column):
        return _two(between, first._replace(number=head.number), _last_end(second, column), written, column)
    raise _refuse_rest(head, column)


def _check_bare_note(parts: CellParts, mark: str) -> None:
    """Refuse a number in brackets that could as well be a second value of the same size."""
    bare = _BARE_NOTE.search(mark)
    if bare is not None and (int(bare[1]) > 20 or any(abs(number) < 2 * int(bare[1]) for number in parts.numbers)):
        raise NumberRefusedError(
            f"has {bare[0].strip()} behind the number, a note or a second value: write '(Note n)'."
        )


def read_parts(text: str, *, dimension: str, unit: Unit | None, marks: Marks, delimiter: str) -> CellParts:
    """Return what a number cell holds.

    Parameters
    ----------
    text : str
        Tidied text of bounded length.
    dimension, unit : str and Unit or None
        Dimension and unit of the column.
    marks, delimiter : Marks and str
        What a comma and a point mean, and what parts the cells of the file.

    Raises
    ------
    NumberRefusedError
        If the text is no number, or can be read in more than one way.
    """
    column = _Column(dimension, unit, marks, delimiter)
    plain = plain_powers(text)
    if _POWER_OR_NOTE.search(plain):
        raise NumberRefusedError("reads as a power of ten or as 10 with a footnote mark: write which.")
    plain, mark = without_marks(plain)
    refusal = ""  # the sentence alone: an error kept here would keep its frames, this one among them, for ever
    for reading, kind in _readings(_FROM.sub("", plain, count=1)):
        try:
            parts = _numbers(reading, column)._replace(kind=kind, mark=mark)
        except NumberRefusedError as error:
            refusal = str(error)
            continue
        _check_bare_note(parts, mark)
        return parts
    raise NumberRefusedError(refusal or no_number(text))
