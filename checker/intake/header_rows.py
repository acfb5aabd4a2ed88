"""Headers of several rows as one: group names over their columns, symbols and numberings left out."""

from __future__ import annotations

import re
from collections.abc import Collection, Mapping, Sequence
from itertools import pairwise

from checker.intake.case_names import split_case
from checker.intake.headers import HeaderReading, read_header
from checker.intake.texts import fold_words, key_of, shown
from checker.intake.unit_words import is_unit_text, size_basis, unit_or_refusal

__all__ = [
    "MECHANICAL",
    "bare",
    "count_numbers",
    "count_understood",
    "exact_extents",
    "is_mechanical",
    "is_neutral",
    "is_numbering",
    "is_symbols_row",
    "is_units_row",
    "join_rows",
    "joined_name",
    "names_quantities",
    "understood",
    "whether_in_group",
]

LONGEST_SYMBOL = 6
LONGEST_HEADER = 120
_WITHOUT_NUMBER = ("", "-", "\u2013", "units", "unit", "uom", "[-]")
MECHANICAL = re.compile(r"(?:(?:mechanical|mech|design|test|hydro ?test|jacket|tracing) ?)+")
_FILLING = re.compile(r"\b(?:conditions?|data|values?|parameters?|details?|information)\b")
_NEUTRAL = frozenset(
    {
        "",
        "process",
        "line",
        "lines",
        "general",
        "pipe",
        "piping",
        "fluid",
        "properties",
        "fluid properties",
        "hydraulic",
        "hydraulics",
        "physical properties",
        "fluid property",
        "stream",
        "pipeline",
        "identification",
        "line identification",
        "location",
        "route",
        "routing",
        "connection",
        "connections",
        "connected",
        "from to",
        "termination",
        "terminations",
    }
)


def bare(cell: str) -> str:
    """Return a units cell without the brackets around it."""
    text = cell.strip()
    return text[1:-1].strip() if text[:1] in "[(" and text[-1:] in "])" and len(text) > 2 else text


def is_units_row(
    row: Sequence[str], headers: Sequence[str], line_column: int, hints: Mapping[str, str] | None = None
) -> bool:
    """Return whether a row beneath the headers holds units: half of its cells at least are known ones.

    Letters that are units as well (P, T) are headers where they fit none of the headers above and mean something
    beneath their groups.
    """
    first = row[line_column].strip().casefold() if line_column < len(row) else ""
    if first not in _WITHOUT_NUMBER:
        return False
    cells = [
        (index, bare(cell)) for index, cell in enumerate(row[: len(headers)]) if index != line_column and cell.strip()
    ]
    known = sum(is_unit_text(cell) and not _is_case(cell) for _, cell in cells)
    fits = [fit for index, cell in cells if (fit := _fits_header(headers[index], cell)) is not None]
    if not known or 2 * known < len(cells) or 2 * sum(fits) < len(fits):
        return False
    known_hints = hints or {}
    joined = () if any(fits) else join_rows(headers, row, known_hints)
    return count_understood(joined, known_hints) <= count_understood(headers, known_hints)


def _is_case(cell: str) -> bool:
    """Return whether a text names a case: ``Min`` beneath a group is no minute."""
    return any(rest == "x" for _, rest in split_case(f"{fold_words(cell)} x"))


def _fits_header(header: str, unit: str) -> bool | None:
    """Return whether a unit is one of the header's field, None where the header promises no number."""
    reading = read_header(header) if len(header) <= LONGEST_HEADER else None
    kinds = set() if reading is None else {field.kind for field in reading.fields}
    if reading is None or kinds == {"text"}:
        return None
    if "size" in kinds:
        return bool(size_basis(unit))
    answers = (unit_or_refusal(unit, field.dimension) for field in reading.fields)
    return any(not isinstance(answer, str) or "gauge or absolute" in answer for answer in answers)


def is_numbering(row: Sequence[str]) -> bool:
    """Return whether a row only numbers the columns: 1, 2, 3, in brackets or not, or A, B, C."""
    cells = [cell.strip().strip("()[]") for cell in row if cell.strip()]
    count = len(cells)
    letters = [chr(ord("A") + index) for index in range(min(count, 26))]
    return count > 2 and cells in ([str(number) for number in range(1, count + 1)], letters)


def is_symbols_row(row: Sequence[str], line_column: int) -> bool:
    """Return whether a row beneath the headers holds symbols (p, T, rho): short texts, no number, no line number."""
    first = row[line_column].strip() if line_column < len(row) else ""
    cells = [cell.strip() for index, cell in enumerate(row) if index != line_column and cell.strip()]
    if first not in ("", "-", "\u2013") or len(cells) < 2:
        return False
    return all(len(cell) <= LONGEST_SYMBOL and not re.fullmatch(r"[-+\d.,\s/]+", cell) for cell in cells)


def understood(header: str, hints: Mapping[str, str]) -> HeaderReading | str | None:
    """Return what a header says, or the field that the criteria give it; None where nothing claims it."""
    if not header or len(header) > LONGEST_HEADER:
        return None
    return hints.get(key_of(header)) or read_header(header)


def count_understood(headers: Sequence[str], hints: Mapping[str, str]) -> int:
    """Return how many different fields and cases the headers name."""
    named = set()
    for header in headers:
        reading = understood(header, hints)
        if isinstance(reading, HeaderReading):
            named.add((reading.fields[0].name, reading.case))
        elif reading:
            named.add((reading, header))
    return len(named)


def count_numbers(headers: Sequence[str], hints: Mapping[str, str]) -> int:
    """Return how many different headers promise a number or a size; a header that the criteria explain counts."""
    readings = {header: understood(header.strip(), hints) for header in headers if header.strip()}
    return sum(
        isinstance(reading, str) or (reading is not None and any(field.kind != "text" for field in reading.fields))
        for reading in readings.values()
    )


def names_quantities(row: Sequence[str], headers: Sequence[str], hints: Mapping[str, str]) -> bool:
    """Return whether a row beneath the headers is one of headers too: two quantities at least, and no number.

    A cell that only repeats the header above it in other words, as a symbol does, names nothing.
    """
    cells = [(index, cell.strip()) for index, cell in enumerate(row[: len(headers)]) if len(cell.strip()) > 1]
    if any(re.fullmatch(r"[-+<>~]?\s*[\d.,]+.*", cell) for cell in row if cell.strip()):
        return False
    named = 0
    for index, cell in cells:
        reading, above = understood(cell, hints), understood(headers[index], hints)
        quantity = isinstance(reading, str) or (reading is not None and reading.fields[0].kind != "text")
        named += quantity and _fields_of(reading).isdisjoint(_fields_of(above))
    return named >= 2


def _fields_of(reading: HeaderReading | str | None) -> frozenset[str]:
    if isinstance(reading, HeaderReading):
        return frozenset(field.name for field in reading.fields)
    return frozenset({reading} if reading else ())


def exact_extents(row: Sequence[str]) -> bool:
    """Return whether a row repeats a group name over neighbouring cells, as merged ones are: then no group spreads."""
    cells = [cell.strip() for cell in row]
    return any(one and one == other for one, other in pairwise(cells))


def is_mechanical(group: str) -> bool:
    """Return whether a group names design, test or the like, whose conditions no flow belongs to."""
    return MECHANICAL.search(fold_words(group)) is not None


def whether_in_group(under: str, group: str) -> str:
    """Return the question whether a header belongs to the group above it or beside it."""
    return (
        f"{shown(under)} stands beneath or beside {shown(group)} in the row above: does it belong to it? Write the "
        "whole name in the header, or name the column in [columns] of the criteria."
    )


def is_neutral(group: str) -> bool:
    """Return whether a group name changes nothing of what stands beneath it (``Process data``)."""
    return " ".join(_FILLING.sub(" ", fold_words(group)).split()) in _NEUTRAL


def joined_name(group: str, under: str, own: bool, hints: Mapping[str, str]) -> str:
    """Return a group name and the header beneath it as one header.

    A group that changes nothing (``Process data``) is left out. One that only spreads from the left (`own` is False)
    is left out over a header of texts, such as remarks; over a number it stays, for it may change what is meant.
    """
    if is_neutral(group):
        whole = f"{group} {under}"
        return whole if understood(under, hints) is None and understood(whole, hints) is not None else under
    short = _FILLING.sub(" ", group.casefold()) if _FILLING.search(group.casefold()) else group
    for name in dict.fromkeys((f"{group} {under}", f"{short} {under}", f"{under} {group}")):
        if understood(" ".join(name.split()), hints) is not None:
            return " ".join(name.split())
    alone = understood(under, hints)
    if not own and isinstance(alone, HeaderReading) and all(field.kind == "text" for field in alone.fields):
        return under
    return f"{group} {under}"


def join_rows(
    upper: Sequence[str], lower: Sequence[str], hints: Mapping[str, str], *, ends: Collection[int] = ()
) -> tuple[str, ...]:
    """Return two header rows as one: a group name holds for the blanks to its right.

    Parameters
    ----------
    upper, lower : sequence of str
        The two rows; they may differ in width.
    hints : mapping of str to str
        Field of each header key that the criteria explain.
    ends : collection of int
        Columns at which a group of the upper row ends, for a larger one above it begins there.
    """
    width = max(len(upper), len(lower))
    upper, lower = [*upper, *[""] * (width - len(upper))], [*lower, *[""] * (width - len(lower))]
    exact = exact_extents(upper)
    group, joined = "", []
    for index, (over, under) in enumerate(zip(map(str.strip, upper), map(str.strip, lower), strict=True)):
        group = over or (group if under and not exact and index not in ends else "")
        if not under or under in ("-", "\u2013") or group.casefold() == under.casefold():
            joined.append(over if over else "")
        elif not group:
            joined.append(under)
        else:
            joined.append(joined_name(group, under, bool(over), hints))
    return tuple(joined)
