"""What each token of a line number is: by agreement with the list's own columns, else by its shape."""

from __future__ import annotations

import re
from collections.abc import Mapping, Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from checker.criteria.nominal_size import CODED, written_size
from checker.intake.sizes import read_size
from checker.line_numbers.folding import folded_keys
from checker.line_numbers.tokens import (
    HEAD,
    MOST_DISTINCT,
    SHARE_OF_SHAPE,
    TAIL,
    WHOLE,
    Group,
    Piece,
    pieces_of,
    share_of_shape,
)
from checker.model import Coded

__all__ = [
    "ListColumns",
    "Role",
    "misplaced",
    "roles_by_columns",
    "roles_by_shape",
    "roles_of_shorter",
    "same_text",
    "sizes_of_tokens",
    "words_of",
]

FloatArray = NDArray[np.float64]
IntArray = NDArray[np.int32]
BoolArray = NDArray[np.bool_]

LEAST_AGREEMENT = {"size": 0.5, "class": 0.5, "service": 0.5, "insulation": 0.5, "tracing": 0.8, "area": 0.8}
LONGEST_SIZE = 12
BASES = ("NPS", "DN", CODED)
_BRACKET_AT_END = re.compile(r"\s*[\[(][^\[\]()]*[\])]$")
_SHAPES = {
    "class": r"[A-Z]{1,2}\d{1,3}[A-Z]{0,2}\d?|\d{1,3}[A-Z]{1,3}\d{0,2}|[A-Z]{2,3}\d[A-Z]\d?",
    "service": r"[A-Z]{1,4}",
    "insulation": r"N|H|C|P|A|I[HCSA]|HC|CC|CP|PP|PS|PF|FP|AC|TR|ET|ST|SJ|HW|TT|CWT|NI|NONE|[A-Z]{2}&[A-Z]{1,2}",
    "suffix": r"\d{1,2}[A-Z]?|[A-Z]",
    "area": r"\d{1,4}[A-Z]?|[A-Z]\d?",
}
_SEQUENCE = r".*\d{3,}[A-Z]{0,2}|X{3,}|\d+"
_MAY_BE_LEFT_OFF = ("insulation", "tracing", "suffix")
_BEYOND_SEQUENCE = {"class": True, "insulation": True, "suffix": True, "area": False}


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
        if mine.name not in chosen and not any(_overlap(mine.piece, other.piece) for other in chosen.values()):
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


def _overlap(one: Piece, other: Piece) -> bool:
    return one.position == other.position and (WHOLE in (one.part, other.part) or one.part == other.part)


def _is_marked_size(text: str) -> bool:
    if len(text) > LONGEST_SIZE:
        return False
    written = written_size(text)
    return written is not None and bool(written.basis) and read_size(text, "", False).nps > 0.0


def _marked_size(pieces: Sequence[Piece]) -> Role | None:
    for piece in pieces:
        values = piece.values
        known = values.codes[values.codes >= 0] if len(values.texts) <= MOST_DISTINCT else ()
        if len(known) and np.array([_is_marked_size(text) for text in values.texts])[known].mean() >= SHARE_OF_SHAPE:
            return Role("size", piece)
    return None


def _sequence(pieces: Sequence[Piece]) -> Role | None:
    fitting = [piece for piece in pieces if share_of_shape(piece.values, _SEQUENCE) >= SHARE_OF_SHAPE]
    best = max(fitting, key=lambda each: (len(each.values.texts), each.part, -each.position), default=None)
    return None if best is None else Role("sequence", best)


def _fits(piece: Piece, name: str) -> bool:
    few = len(piece.values.texts) <= MOST_DISTINCT
    return few and share_of_shape(piece.values, _SHAPES[name]) >= SHARE_OF_SHAPE


def _shaped(pieces: Sequence[Piece], name: str, after: int) -> Role | None:
    """Return the first piece of a shape that stands where such a part stands: before or beyond the sequence."""
    beyond = _BEYOND_SEQUENCE.get(name)
    for piece in pieces:
        right_side = beyond is None or (piece.position > after) == beyond
        if right_side and (name != "suffix" or piece.position == after + 1) and _fits(piece, name):
            return Role(name, piece)
    return None


def roles_by_shape(pieces: Sequence[Piece], known: Sequence[Role]) -> list[Role]:
    """Return what the pieces that no column claims look like, in the order in which that can be told."""
    roles = list(known)

    def left() -> list[Piece]:
        return [piece for piece in pieces if not any(_overlap(piece, role.piece) for role in roles)]

    def take(role: Role | None) -> None:
        if role is not None:
            roles.append(role)

    named = {role.name for role in roles}
    if "size" not in named:
        take(_marked_size(left()))
    take(_sequence(left()))
    after = next((role.piece.position for role in roles if role.name == "sequence"), -1)
    for name in ("service", "class", "suffix", "insulation", "area"):
        if name not in named:
            take(_shaped(left(), name, after))
    return roles[len(known) :]


def words_of(roles: Sequence[Role], width: int) -> tuple[str, ...]:
    """Return what each token of a number is, in order; ``part`` where that is not known."""
    by_place = {(role.piece.position, role.piece.part): role.name for role in roles}
    words = []
    for position in range(width):
        halves = [by_place.get((position, part)) for part in (HEAD, TAIL)]
        whole = by_place.get((position, WHOLE))
        if whole or not any(halves):
            words.append(whole or "part")
        else:
            words.append(" and ".join(half or "part" for half in halves))
    return tuple(words)


def roles_of_shorter(group: Group, roles: Sequence[Role]) -> list[Role] | None:
    """Return the roles of a rarer layout that only lacks the last tokens of a commoner one; None where it is another.

    Insulation, tracing, a suffix and what is not known may be left off; a size, service, sequence or class may not.
    """
    pieces = {(piece.position, piece.part): piece for piece in pieces_of(group)}
    shorter = []
    for role in roles:
        piece = pieces.get((role.piece.position, role.piece.part))
        if piece is not None:
            shorter.append(Role(role.name, piece, role.field, role.basis))
        elif role.name not in _MAY_BE_LEFT_OFF or role.piece.position < len(group.columns):
            return None
    return shorter
