"""What each token of a line number is, by agreement with the list's own columns."""

from __future__ import annotations

import re
from collections.abc import Mapping, Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from checker.criteria.nominal_size import CODED
from checker.intake.sizes import read_size
from checker.line_numbers.folding import folded_keys
from checker.line_numbers.tokens import MOST_DISTINCT, WHOLE, Group, Piece
from checker.model import Coded

__all__ = [
    "LONGEST_SIZE", "ListColumns", "Role", "misplaced", "overlap", "roles_by_columns", "same_text", "sizes_of_tokens",
]  # fmt: skip

FloatArray = NDArray[np.float64]
IntArray = NDArray[np.int32]
BoolArray = NDArray[np.bool_]

LEAST_AGREEMENT = {"size": 0.5, "class": 0.5, "service": 0.5, "insulation": 0.5, "tracing": 0.8, "area": 0.8}
LONGEST_SIZE = 12
BASES = ("NPS", "DN", CODED)
_BRACKET_AT_END = re.compile(r"\s*[\[(][^\[\]()]*[\])]$")


@dataclass(frozen=True, slots=True)
class ListColumns:
    """The list's own columns over its line cases: the line of each, the size in NPS, and texts by role and field."""

    line: IntArray
    size: FloatArray | None
    texts: Mapping[str, Mapping[str, Coded]]

    def states(self, role: str) -> bool:
        """Return whether the list has a column for a role."""
        return self.size is not None if role == "size" else bool(self.texts.get(role))


@dataclass(frozen=True, slots=True)
class Role:
    """What a piece of a number is; `field` is the column it is held against, empty where none is."""

    name: str
    piece: Piece
    field: str = ""
    basis: str = ""


def sizes_of_tokens(values: Coded, basis: str) -> FloatArray:
    """Return the NPS of each token of a piece, NaN where it is no nominal size; a marked one has its own basis."""
    table = [read_size(text, basis, False).nps if len(text) <= LONGEST_SIZE else np.nan for text in values.texts]
    return np.array([*table, np.nan])[values.codes]


def same_text(values: Coded, column: Coded) -> tuple[IntArray, IntArray]:
    """Return two tables of codes in which equal texts are equal: of the tokens, and of the column's texts.

    Compared are the folded keys; a token's bracket at its end (``ST(3")``) may be left off.
    """
    keys = folded_keys(column.texts)
    places = {key: place for place, key in enumerate(dict.fromkeys(keys))}
    theirs = np.array([*(places[key] for key in keys), -1], dtype=np.int32)
    tokens = folded_keys(values.texts)
    shorter = folded_keys([_BRACKET_AT_END.sub("", text) for text in values.texts])
    mine = [places.get(token, places.get(short, -2)) for token, short in zip(tokens, shorter, strict=True)]
    return np.array([*mine, -1], dtype=np.int32), theirs


@dataclass(frozen=True, slots=True)
class _Candidate:
    share: float
    matched: int
    role: Role

    @property
    def rank(self) -> tuple[float, int, int, int, str]:
        return -self.share, -self.matched, self.role.piece.part, self.role.piece.position, self.role.name


def _candidate(same: BoolArray, both: BoolArray, role: Role) -> _Candidate | None:
    stated = int(both.sum())
    matched = int((same & both).sum())
    share = matched / stated if stated else 0.0
    return _Candidate(share, matched, role) if matched and share >= LEAST_AGREEMENT[role.name] else None


def _of_size(piece: Piece, at: IntArray, size: FloatArray) -> list[_Candidate]:
    stated = np.isfinite(size) & (at >= 0)
    found = []
    for basis in BASES:
        mine = np.append(sizes_of_tokens(piece.values, basis), np.nan)[at]
        both = stated & (np.append(piece.values.codes, -1)[at] >= 0)
        candidate = _candidate(mine == size, both, Role("size", piece, "size", basis))
        found += [candidate] if candidate else []
    return found


def _of_text(piece: Piece, at: IntArray, role: str, field: str, column: Coded) -> list[_Candidate]:
    mine, theirs = same_text(piece.values, column)
    tokens = mine[np.append(piece.values.codes, -1)[at]]
    cells = theirs[column.codes]
    both = (at >= 0) & (tokens != -1) & (cells != -1)
    candidate = _candidate(tokens == cells, both, Role(role, piece, field))
    return [candidate] if candidate else []


def roles_by_columns(pieces: Sequence[Piece], at: IntArray, columns: ListColumns) -> list[Role]:
    """Return the pieces that agree with a column of the list, the best of each.

    Parameters
    ----------
    pieces : sequence of Piece
        Of one group of numbers.
    at : int array, shape (line cases,)
        Place in the group of each line case's number, -1 where it is not in the group.
    columns : ListColumns
        The list's own columns.
    """
    found: list[_Candidate] = []
    for piece in pieces:
        if len(piece.values.texts) > MOST_DISTINCT:
            continue
        if columns.size is not None:
            found += _of_size(piece, at, columns.size)
        for role, fields in columns.texts.items():
            for field, column in fields.items():
                found += _of_text(piece, at, role, field, column)
    chosen: dict[str, Role] = {}
    for candidate in sorted(found, key=lambda each: each.rank):
        mine = candidate.role
        if mine.name not in chosen and not any(overlap(mine.piece, other.piece) for other in chosen.values()):
            chosen[mine.name] = mine
    return list(chosen.values())


def misplaced(group: Group, roles: Sequence[Role], at: IntArray, columns: ListColumns) -> IntArray:
    """Return the numbers of a group that state their class at another place than the others do.

    Their token there is not the column's text, and another of their tokens is.
    """
    role = next((role for role in roles if role.name == "class" and role.field), None)
    if role is None:
        return np.zeros(0, dtype=np.int32)
    column = columns.texts["class"][role.field]

    def agrees(values: Coded) -> BoolArray:
        mine, theirs = same_text(values, column)
        tokens, cells = mine[np.append(values.codes, -1)[at]], theirs[column.codes]
        return np.asarray((at >= 0) & (tokens >= 0) & (tokens == cells), dtype=np.bool_)

    differs = (at >= 0) & ~agrees(role.piece.values) & (column.codes >= 0)
    if not differs.any():
        return np.zeros(0, dtype=np.int32)
    elsewhere = np.zeros(at.shape, dtype=np.bool_)
    for position, values in enumerate(group.columns):
        if position != role.piece.position and len(values.texts) <= MOST_DISTINCT:
            elsewhere |= agrees(values)
    return np.unique(at[differs & elsewhere])


def overlap(one: Piece, other: Piece) -> bool:
    """Return whether two pieces share characters of one token."""
    return one.position == other.position and (WHOLE in (one.part, other.part) or one.part == other.part)
