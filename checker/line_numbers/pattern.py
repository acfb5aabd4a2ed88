"""The pattern of a list's line numbers, and the parts that each number states by it."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace

import numpy as np
from numpy.typing import NDArray

from checker.line_numbers.roles import ListColumns, Role, misplaced, roles_by_columns, sizes_of_tokens
from checker.line_numbers.shapes import roles_by_shape, roles_of_shorter, words_of
from checker.line_numbers.tokens import Group, TokenTable, pieces_of, table_of_tokens
from checker.model import Coded

__all__ = ["NumberLayout", "NumberPattern", "ParsedNumbers", "parse_numbers"]

FloatArray = NDArray[np.float64]
IntArray = NDArray[np.int32]
BoolArray = NDArray[np.bool_]

COMPARED = ("size", "service", "class", "insulation", "tracing", "area")
PARTS = ("service", "class", "insulation", "tracing", "area", "sequence", "suffix")
MOST_OUTLIERS = 10


@dataclass(frozen=True, slots=True)
class NumberLayout:
    """One order of parts: what each token is, and how many distinct numbers of the list have it."""

    parts: tuple[str, ...]
    numbers: int


@dataclass(frozen=True, slots=True)
class NumberPattern:
    """The pattern of a list's line numbers.

    Attributes
    ----------
    delimiters : str
        Signs that part the tokens.
    layouts : tuple of NumberLayout
        Orders of parts, the commonest first.
    numbers, fitting : int
        Distinct numbers of the list, and those that fit one of the layouts.
    outliers : tuple of str
        The first numbers that fit none, in order.
    compared : mapping of str to str
        Parts held against a column of the list, and its field.
    doubtful : tuple of str
        Parts that stand in the numbers and in a column, but agree in too few lines to tell that they are the same.
    """

    delimiters: str
    layouts: tuple[NumberLayout, ...]
    numbers: int
    fitting: int
    outliers: tuple[str, ...]
    compared: Mapping[str, str]
    doubtful: tuple[str, ...]

    @property
    def sentence(self) -> str:
        """The pattern in words: ``size - service - sequence - class, 171 of 173 numbers``."""
        if not self.layouts:
            return "no pattern: the list has no line numbers"
        shown = [f"{' - '.join(layout.parts)}" for layout in self.layouts]
        counts = [f"{layout.numbers} of {self.numbers} numbers" for layout in self.layouts]
        return "; ".join(f"{words}, {count}" for words, count in zip(shown, counts, strict=True))


@dataclass(frozen=True, slots=True)
class ParsedNumbers:
    """The parts of each line number.

    Attributes
    ----------
    pattern : NumberPattern
    fits : bool array, shape (lines,)
        True where the number fits the pattern.
    size : float array, shape (lines,)
        Size that the number states, NPS; NaN where it states none that can be read.
    parts : mapping of str to Coded, shape (lines,)
        The other parts: service, class, insulation, tracing, area, sequence, suffix.
    """

    pattern: NumberPattern
    fits: BoolArray
    size: FloatArray
    parts: Mapping[str, Coded]


class _Parts:
    """The parts of the distinct numbers, put together group by group."""

    def __init__(self, count: int) -> None:
        self.fits = np.zeros(count, dtype=np.bool_)
        self.size = np.full(count, np.nan)
        self.codes = {name: np.full(count, -1, dtype=np.int32) for name in PARTS}
        self.texts: dict[str, tuple[str, ...]] = dict.fromkeys(PARTS, ())

    def put(self, group: Group, roles: Sequence[Role]) -> None:
        """Take over the parts of a group's numbers; one whose size cannot be read does not fit."""
        fits = np.ones(group.members.size, dtype=np.bool_)
        for role in roles:
            values = role.piece.values
            if role.name == "size":
                size = sizes_of_tokens(values, role.basis)
                self.size[group.members] = size
                fits &= np.isfinite(size) | (values.codes < 0)
            elif role.name in self.codes:
                before = len(self.texts[role.name])
                self.texts[role.name] += values.texts
                self.codes[role.name][group.members] = np.where(values.codes < 0, -1, values.codes + before)
        self.fits[group.members] = fits

    def of_lines(self, of_text: IntArray) -> tuple[BoolArray, FloatArray, dict[str, Coded]]:
        """Return fits, size and texts over the lines; a line without a number (code -1) states nothing."""
        parts = {
            name: Coded(np.append(codes, np.int32(-1))[of_text], self.texts[name]) for name, codes in self.codes.items()
        }
        return np.append(self.fits, False)[of_text], np.append(self.size, np.nan)[of_text], parts


class _Reading:
    """The groups of a list's numbers, read one after the other against its columns."""

    def __init__(self, table: TokenTable, columns: ListColumns) -> None:
        self.table, self.columns = table, columns
        self.number = table.of_text[columns.line]
        self.parts = _Parts(len(table.numbers))
        self.roles: list[list[Role]] = []
        self.doubtful: set[str] = set()
        for group in table.groups:
            self._read(group)
        for group in table.rare:
            self._read_shorter(group)

    def _at(self, group: Group) -> IntArray:
        """Return the place in the group of each line case's number, -1 where it is in another."""
        at = np.full(len(self.table.numbers) + 1, -1, dtype=np.int32)
        at[group.members] = np.arange(group.members.size, dtype=np.int32)
        return at[self.number]

    def _read(self, group: Group) -> None:
        at, columns = self._at(group), self.columns
        pieces = pieces_of(group)
        known = roles_by_columns(pieces, at, columns)
        shaped = roles_by_shape(pieces, known)
        for place, role in enumerate(shaped):
            if role.name == "size" and columns.states("size"):
                shaped[place] = replace(role, field="size")
            elif role.name == "class" and columns.states("class"):
                self.doubtful.add("class")
        self.roles.append([*known, *shaped])
        self._put(group, self.roles[-1], at)

    def _read_shorter(self, group: Group) -> None:
        """Read a rare group by the roles of a commoner one of which it only lacks the end; else it does not fit."""
        for roles in self.roles:
            shorter = roles_of_shorter(group, roles)
            if shorter:
                self._put(group, shorter, self._at(group))
                return

    def _put(self, group: Group, roles: Sequence[Role], at: IntArray) -> None:
        self.parts.put(group, roles)
        moved = misplaced(group, roles, at, self.columns)
        self.parts.fits[group.members[moved]] = False

    def pattern(self) -> NumberPattern:
        """Return the pattern of the whole list."""
        table, fits = self.table, self.parts.fits
        fields = {role.name: role.field for roles in reversed(self.roles) for role in roles if role.field}
        layouts = [
            NumberLayout(words_of(roles, len(group.columns)), int(fits[group.members].sum()))
            for group, roles in zip(table.groups, self.roles, strict=True)
        ]
        layouts += self._shorter_layouts()
        outliers = sorted(table.numbers[place] for place in np.flatnonzero(~fits))
        return NumberPattern(
            delimiters=table.delimiters,
            layouts=tuple(layouts),
            numbers=len(table.numbers),
            fitting=int(fits.sum()),
            outliers=tuple(outliers[:MOST_OUTLIERS]),
            compared={name: fields[name] for name in COMPARED if name in fields},
            doubtful=tuple(sorted(self.doubtful)),
        )

    def _shorter_layouts(self) -> list[NumberLayout]:
        layouts = []
        for group in self.table.rare:
            count = int(self.parts.fits[group.members].sum())
            width = len(group.columns)
            longer = next((roles for roles in self.roles if roles_of_shorter(group, roles)), None)
            if count and longer is not None:
                layouts.append(NumberLayout(words_of(longer, width), count))
        return layouts


def parse_numbers(texts: Sequence[str], columns: ListColumns) -> ParsedNumbers:
    """Infer the pattern of a list's line numbers and read their parts.

    Parameters
    ----------
    texts : sequence of str
        Line numbers as written, one a line.
    columns : ListColumns
        The list's own size, service, class, insulation, tracing and area, over its line cases.

    Returns
    -------
    ParsedNumbers
        A token is the part whose column it agrees with in at least half of the lines that state both (tracing and
        area: in 0.8), else what its shape says. A number that states its class at another place does not fit. Rows in
        another order give the same.
    """
    table = table_of_tokens(texts)
    reading = _Reading(table, columns)
    fits, size, parts = reading.parts.of_lines(table.of_text)
    return ParsedNumbers(reading.pattern(), fits, size, parts)
