"""Providers: the parts of a line number, whether they agree with the columns, doubled numbers and look-alikes."""

from __future__ import annotations

from typing import TYPE_CHECKING, Any

import numpy as np
from numpy.typing import NDArray

from checker.evaluation.provider import provider
from checker.intake.size_doubts import in_words
from checker.intake.texts import shown
from checker.line_numbers.alike import why_alike
from checker.line_numbers.folding import folded_keys
from checker.line_numbers.pattern import NumberPattern, ParsedNumbers, parse_numbers
from checker.line_numbers.roles import ListColumns, same_text
from checker.line_numbers.service_tokens import ServiceTokens, service_tokens
from checker.line_numbers.twins import doubled_rows, look_alikes
from checker.model import Coded, Gap, base_case
from checker.ruling.tristate import NO, UNKNOWN, YES

if TYPE_CHECKING:
    from checker.evaluation.values import Values

__all__ = ["PROVIDERS", "mismatch_words", "why_not_compared"]

FloatArray = NDArray[np.float64]
IntArray = NDArray[np.int32]
BoolArray = NDArray[np.bool_]
CodeArray = NDArray[np.int8]
Named = dict[str, Any]

MOST_EXPLAINED = 2_000
CODED_SERVICE = "coded service"


def number_columns(
    *,
    line: IntArray,
    size_listed: FloatArray,
    size_gap: CodeArray,
    service_listed: Coded,
    fluid_listed: Coded,
    piping_class_listed: Coded,
    piping_class_gap: CodeArray,
    insulation_listed: Coded,
    tracing_listed: Coded,
    area_listed: Coded,
) -> ListColumns:
    """Return the list's own columns that a line number may repeat."""
    texts = {
        "service": {"service": service_listed, "fluid": fluid_listed},
        "class": {"piping_class": piping_class_listed},
        "insulation": {"insulation": insulation_listed},
        "tracing": {"tracing": tracing_listed},
        "area": {"area": area_listed},
    }
    stated = {
        role: {field: column for field, column in fields.items() if bool((column.codes >= 0).any())}
        for role, fields in texts.items()
    }
    if bool((piping_class_gap != Gap.NO_COLUMN).any()):
        stated["class"] = texts["class"]
    size = size_listed if bool((size_gap != Gap.NO_COLUMN).any()) else None
    return ListColumns(line, size, stated)


def number_parts(*, line_number_text: Coded, number_columns: ListColumns) -> Named:
    """Return what each line number states by the pattern of the list's numbers: size (NPS), service, class ..."""
    parsed = parse_numbers(line_number_text.texts, number_columns)
    line = line_number_text.codes
    return {
        "number_parsed": parsed,
        "number_pattern": parsed.pattern,
        "number_size": parsed.size[line],
        "number_service": parsed.parts["service"].take(line),
        "number_class": parsed.parts["class"].take(line),
        "number_insulation": parsed.parts["insulation"].take(line),
        "number_sequence": parsed.parts["sequence"].take(line),
    }


def _column_of(pattern: NumberPattern, role: str, columns: ListColumns) -> Coded | None:
    return columns.texts[role].get(pattern.compared[role])


def _compared(parsed: ParsedNumbers, role: str, columns: ListColumns) -> tuple[BoolArray, BoolArray, BoolArray]:
    """Return where the number states a part, where its column does, and where the two are the same."""
    if role == "size":
        mine = parsed.size[columns.line]
        cells = np.full(mine.shape, np.nan) if columns.size is None else columns.size
        return np.isfinite(mine), np.isfinite(cells), np.equal(mine, cells)
    part = parsed.parts[role].take(columns.line)
    column = _column_of(parsed.pattern, role, columns)
    if column is None:
        nothing = np.zeros(part.codes.shape, dtype=np.bool_)
        return part.codes >= 0, nothing, nothing
    tokens, cells = same_text(part, column)
    return part.codes >= 0, column.codes >= 0, np.equal(tokens[part.codes], cells[column.codes])


def number_service_tokens(*, number_parsed: ParsedNumbers, number_columns: ListColumns) -> ServiceTokens:
    """Return over the line cases whether a number's service token is the usual one of the service in its column.

    For numbers that code the service (CW for cooling water); a token that repeats its column is held against that.
    """
    line, column = number_columns.line, number_columns.texts["service"].get("service")
    nothing = Coded(np.full(line.shape, -1, dtype=np.int32), ())
    if column is None or "service" in number_parsed.pattern.compared:
        return service_tokens(nothing, nothing)
    _, first = np.unique(line, return_index=True)
    token = number_parsed.parts["service"]
    fitting = Coded(np.where(number_parsed.fits, token.codes, -1).astype(np.int32), token.texts)
    told, slip, usual = service_tokens(fitting, column.take(first.astype(np.int32)))
    return ServiceTokens(told[line], slip[line], usual.take(line))


def number_against_columns(
    *, number_parsed: ParsedNumbers, number_columns: ListColumns, number_service_tokens: ServiceTokens
) -> Named:
    """Return whether a part of the line number disagrees with its column; told of a line only where all can be told.

    ``number_against_columns`` is 1 where a part disagrees, 0 where every part that the number states agrees, -1 where
    the number does not fit the list's pattern, a cell is missing, or what is the class in the numbers is in doubt.
    ``number_pattern_known`` is 1 where parts of the list's numbers can be held against columns, 0 where there are no
    such parts, -1 where it is in doubt. ``number_parts_differing`` has one bit a part, in the pattern's order, and
    beyond them one for a service that the other numbers code in another way.
    """
    pattern = number_parsed.pattern
    cases = number_columns.line.shape
    differing = np.zeros(cases, dtype=np.int32)
    told, missing = np.zeros(cases, dtype=np.bool_), np.zeros(cases, dtype=np.bool_)
    for place, role in enumerate(pattern.compared):
        in_number, in_column, same = _compared(number_parsed, role, number_columns)
        told |= in_number & in_column
        missing |= in_number & ~in_column
        differing |= np.where(in_number & in_column & ~same, 1 << place, 0).astype(np.int32)
    told |= number_service_tokens.told
    differing |= np.where(number_service_tokens.slip, 1 << len(pattern.compared), 0).astype(np.int32)
    fits = number_parsed.fits[number_columns.line]
    differing[~fits] = 0
    unknown = ~fits | missing | ~told | bool(pattern.doubtful)
    known = YES if pattern.compared else UNKNOWN if pattern.doubtful else NO
    return {
        "number_against_columns": np.select([differing > 0, unknown], [YES, UNKNOWN], NO).astype(np.int8),
        "number_pattern_known": np.where(number_service_tokens.told, YES, known).astype(np.int8),
        "number_parts_differing": differing,
    }


def _said(role: str, value: str) -> str:
    if role == CODED_SERVICE:
        return f"service {value}"
    return f"NPS {value}" if role == "size" else f"{role} {shown(value)}"


def number_mismatch_said(
    *,
    number_parsed: ParsedNumbers,
    number_columns: ListColumns,
    number_service_tokens: ServiceTokens,
    number_parts_differing: IntArray,
) -> Coded:
    """Return in words where a line number and the columns disagree; missing where they do not."""
    roles = list(number_parsed.pattern.compared)
    codes = np.full(number_parts_differing.shape, -1, dtype=np.int32)
    cases = np.flatnonzero(number_parts_differing)
    if not cases.size:
        return Coded(codes, ())
    sides = [side for role in roles for side in _sides(number_parsed, role, number_columns)]
    if number_service_tokens.slip.any():
        roles.append(CODED_SERVICE)
        sides += _sides_of_service(number_parsed, number_columns, number_service_tokens)
    bits = number_parts_differing[cases]
    keys = [np.where(bits >> (place // 2) & 1, side.codes[cases], -1) for place, side in enumerate(sides)]
    _, first, kind = np.unique(np.column_stack((bits, *keys)), axis=0, return_index=True, return_inverse=True)
    sentences = []
    for case, differing in zip(cases[first].tolist(), bits[first].tolist(), strict=True):
        mine = [place for place in range(len(roles)) if differing >> place & 1]
        number, column = (
            " and ".join(_said(roles[place], sides[2 * place + side].text(case)) for place in mine) for side in (0, 1)
        )
        sentences.append(f"the number says {number}, the columns say {column}")
    codes[cases] = kind.ravel()
    return Coded(codes, tuple(sentences))


def _sides(parsed: ParsedNumbers, role: str, columns: ListColumns) -> tuple[Coded, Coded]:
    """Return a part as the number and as the column state it, over the line cases."""
    if role == "size":
        column_size = np.full(columns.line.shape, np.nan) if columns.size is None else columns.size
        return _size_words(parsed.size[columns.line]), _size_words(column_size)
    mine = parsed.parts[role].take(columns.line)
    return mine, _column_of(parsed.pattern, role, columns) or Coded(np.full(columns.line.shape, -1, dtype=np.int32), ())


def _sides_of_service(parsed: ParsedNumbers, columns: ListColumns, tokens: ServiceTokens) -> tuple[Coded, Coded]:
    """Return the service as the number codes it, and as the column says it with the other numbers' code."""
    column, usual, mine = columns.texts["service"]["service"], tokens.usual, parsed.parts["service"]
    codes = np.full(columns.line.shape, -1, dtype=np.int32)
    cases = np.flatnonzero(tokens.slip)
    pairs, kind = np.unique(np.column_stack((column.codes[cases], usual.codes[cases])), axis=0, return_inverse=True)
    codes[cases] = kind.ravel()
    texts = tuple(
        f"{shown(column.texts[said])}, which the other numbers call {shown(usual.texts[code])}"
        for said, code in pairs.tolist()
    )
    return Coded(mine.codes[columns.line], tuple(map(shown, mine.texts))), Coded(codes, texts)


def _size_words(size: FloatArray) -> Coded:
    distinct, codes = np.unique(size, return_inverse=True)
    known = np.isfinite(size)
    texts = tuple(in_words(float(each)) if np.isfinite(each) else "" for each in distinct)
    return Coded(np.where(known, codes.ravel(), -1).astype(np.int32), texts)


def _codes_of_text(column: Coded) -> IntArray:
    """Return codes in which texts of one folded key are equal, -1 where missing."""
    places: dict[str, int] = {}
    table = [places.setdefault(key, len(places)) for key in folded_keys(column.texts)]
    return np.array([*table, -1], dtype=np.int32)[column.codes]


def _codes_of_size(size: FloatArray) -> IntArray:
    _, codes = np.unique(size, return_inverse=True)
    return np.where(np.isfinite(size), codes.ravel(), -1).astype(np.int32)


def doubled_line_number(
    *, line: IntArray, line_group: IntArray, case: Coded, from_listed: Coded, to_listed: Coded, size_listed: FloatArray
) -> BoolArray:
    """Return True where one line number states one case on several rows that nothing tells apart.

    Rows that differ in from, to or size are segments, rows of other cases are cases: one number on several rows is
    then in order. A cell that is blank, on HOLD or unreadable tells nothing apart.
    """
    doubled = np.zeros(line.shape, dtype=np.bool_)
    lines = int(line.max(initial=-1)) + 1
    if not lines or int(line_group.max()) + 1 == lines:
        return doubled
    names = [base_case(text) for text in case.texts]
    table = np.array([*(names.index(name) for name in names), len(names)], dtype=np.int64)
    mine = table[case.codes]
    row_case = line.astype(np.int64) * (len(names) + 1) + mine
    _, first, row_of = np.unique(row_case, return_index=True, return_inverse=True)
    group = line_group.astype(np.int64) * (len(names) + 1) + mine
    _, group_of_row = np.unique(group[first], return_inverse=True)
    told_by = np.column_stack((_codes_of_text(from_listed), _codes_of_text(to_listed), _codes_of_size(size_listed)))
    doubled[:] = doubled_rows(group_of_row.ravel().astype(np.int32), told_by[first])[row_of.ravel()]
    return doubled


def look_alike(*, line_number_text: Coded) -> Named:
    """Return whether another line's number looks the same and is written otherwise, and in which characters.

    Held are `why_alike` sentences for the first lines that have one; the others say no more than that they look alike.
    """
    texts = line_number_text.texts
    other = look_alikes(texts)
    other[[place for place in np.flatnonzero(other >= 0) if not any(map(str.isdigit, texts[place]))]] = -1
    sentences: dict[str, int] = {}
    codes = np.full(len(texts), -1, dtype=np.int32)
    for count, place in enumerate(np.flatnonzero(other >= 0).tolist()):
        twin = texts[other[place]]
        why = f": {why_alike(texts[place], twin)}" if count < MOST_EXPLAINED else ""
        sentence = f"looks like {shown(twin)}{why}" if count < MOST_EXPLAINED else "looks like another line number"
        codes[place] = sentences.setdefault(sentence, len(sentences))
    line = line_number_text.codes
    return {
        "look_alike_number": (other >= 0)[line],
        "look_alike_said": Coded(codes[line], tuple(sentences)),
    }


def mismatch_words(values: Values, line_case: int) -> str:
    """Return in words where a line number disagrees with its columns: ``the number says NPS 6 ...``; else empty."""
    said: Coded = values["number_mismatch_said"]
    return said.text(line_case)


def why_not_compared(values: Values, line_case: int) -> tuple[str, str]:
    """Return why a line number could not be held against the columns: a sentence, or the field whose cell is missing.

    Returns
    -------
    sentence, field : str
        One of them is empty; both are where the number was compared.
    """
    if int(values["number_against_columns"][line_case]) != UNKNOWN:
        return "", ""
    parsed: ParsedNumbers = values["number_parsed"]
    columns: ListColumns = values["number_columns"]
    pattern = parsed.pattern
    if not parsed.fits[columns.line[line_case]]:
        return f"the line number does not fit the pattern of the list's numbers ({pattern.sentence})", ""
    for role, field in pattern.compared.items():
        in_number, in_column, _ = _compared(parsed, role, columns)
        if in_number[line_case] and not in_column[line_case]:
            return "", field
    if pattern.doubtful:
        return "the numbers' class agrees with the column in too few lines to tell which part of the number it is", ""
    return "the line number states none of the parts that the list has columns for", ""


PROVIDERS = (
    provider(number_columns),
    provider(
        number_parts,
        "number_parsed",
        "number_pattern",
        "number_size",
        "number_service",
        "number_class",
        "number_insulation",
        "number_sequence",
    ),
    provider(number_service_tokens),
    provider(number_against_columns, "number_against_columns", "number_pattern_known", "number_parts_differing"),
    provider(number_mismatch_said),
    provider(doubled_line_number),
    provider(look_alike, "look_alike_number", "look_alike_said"),
)
