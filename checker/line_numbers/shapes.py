"""What a token of a line number looks like, where no column of the list says what it is."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from checker.criteria.nominal_size import written_size
from checker.intake.sizes import read_size
from checker.line_numbers.roles import LONGEST_SIZE, Role, overlap
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

__all__ = ["roles_by_shape", "roles_of_shorter", "words_of"]

_SHAPES = {
    "class": r"[A-Z]{1,2}\d{1,3}[A-Z]{0,2}\d?|\d{1,3}[A-Z]{1,3}\d{0,2}|[A-Z]{2,3}\d[A-Z]\d?",
    "service": r"[A-Z]{1,4}",
    "insulation": r"N|H|C|P|A|I[HCSA]|HC|CC|CP|PP|PS|PF|FP|AC|TR|ET|ST|SJ|HW|TT|CWT|NI|NONE|[A-Z]{2}&[A-Z]{1,2}",
    "suffix": r"\d{1,2}[A-Z]?|[A-Z]",
    "area": r"\d{1,4}[A-Z]?|[A-Z]\d?",
}
_SEQUENCE = r"[^\n]{0,12}\d{3,12}[A-Z]{0,2}|X{3,}|\d+"
_MAY_BE_LEFT_OFF = ("insulation", "tracing", "suffix")
_BEYOND_SEQUENCE = {"class": True, "insulation": True, "suffix": True, "area": False}


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
        return [piece for piece in pieces if not any(overlap(piece, role.piece) for role in roles)]

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
