"""Which line numbers of two sets are near each other: one part another, or the sequence a figure or a step away.

Only numbers that share all parts but one, or all characters but the delimiters, are ever held against each other, so
the work grows with the numbers and not with their pairs.
"""

from __future__ import annotations

import re
from bisect import bisect_left
from collections import defaultdict
from collections.abc import Iterator, Sequence
from typing import NamedTuple

from checker.intake.texts import shown
from checker.line_numbers.folding import plain_numbers

__all__ = ["Near", "near_pairs"]

NEAR_SEQUENCE = 10
MOST_A_KEY = 20
_PARTING = re.compile(r"[-/_. ]+")
_FRACTION = re.compile(r"(\d)[- .](\d)/(\d)")
_SEQUENCE = re.compile(r"[A-Z]{0,4}(\d{3,12})[A-Z]{0,2}", re.ASCII)
_DELIMITER = re.compile(r"[\W_]+")
MOST_TOKENS = 16
Key = tuple[object, ...]


class Near(NamedTuple):
    """Two numbers near each other, by their places in the two sets, and what tells them apart."""

    first: int
    second: int
    words: str


class _Pair(NamedTuple):
    kind: int
    distance: int
    words: str


def _tokens(plain: str) -> tuple[str, ...]:
    return tuple(_PARTING.split(_FRACTION.sub("\\1+\\2:\\3", plain).strip("-/_. "))[:MOST_TOKENS])


def _shortened(token: str) -> Iterator[str]:
    """Yield a token and the token without each one of its characters: two that share one are a slip apart, or two."""
    yield token
    for place in range(len(token)):
        yield token[:place] + token[place + 1 :]


def _keys(plain: str, tokens: tuple[str, ...]) -> Iterator[Key]:
    yield ("letters", _DELIMITER.sub("", plain))
    yield ("whole", tokens)
    for place, token in enumerate(tokens):
        others = tokens[:place] + tokens[place + 1 :]
        yield ("whole", others)
        if _SEQUENCE.fullmatch(token):
            yield from (("slip", place, others, short) for short in _shortened(token))
        else:
            yield ("part", place, others)


def _slips(one: str, other: str) -> int:
    """Return 1 where two texts are one character, or one exchange of neighbours, apart; 2 for more."""
    start = next((i for i, (a, b) in enumerate(zip(one, other, strict=False)) if a != b), min(len(one), len(other)))
    rest, remainder = one[start:], other[start:]
    alike = (rest[1:] == remainder[1:], rest[1:] == remainder, rest == remainder[1:])
    exchanged = rest[:2] == remainder[:2][::-1] and rest[2:] == remainder[2:]
    return 1 if any(alike) or exchanged else 2


def _step(one: str, other: str) -> int:
    """Return how far apart two sequence numbers are, beyond `NEAR_SEQUENCE` where letters differ too."""
    first, second = _SEQUENCE.fullmatch(one), _SEQUENCE.fullmatch(other)
    if first is None or second is None or one.replace(first[1], "") != other.replace(second[1], ""):
        return NEAR_SEQUENCE + 1
    return abs(int(first[1]) - int(second[1]))


def _differ(one: str, other: str) -> str:
    return f"{shown(_shown(one))} in the list, {shown(_shown(other))} on the drawings"


def _shown(token: str) -> str:
    return token.replace("+", "-").replace(":", "/")


def _one_part(one: tuple[str, ...], other: tuple[str, ...]) -> _Pair | None:
    differing = [place for place, (a, b) in enumerate(zip(one, other, strict=True)) if a != b]
    if len(differing) != 1:
        return None
    first, second = one[differing[0]], other[differing[0]]
    if not (_SEQUENCE.fullmatch(first) and _SEQUENCE.fullmatch(second)):
        return _Pair(2, 0, f"the same but for one part: {_differ(first, second)}")
    step = _step(first, second)
    if _slips(first, second) == 1:
        return _Pair(0, step, f"the same but for one slip in the sequence: {_differ(first, second)}")
    near = step <= NEAR_SEQUENCE
    return _Pair(1, step, f"the same but for a near sequence: {_differ(first, second)}") if near else None


def _one_more(one: tuple[str, ...], other: tuple[str, ...]) -> _Pair | None:
    longer, shorter = (one, other) if len(one) > len(other) else (other, one)
    place = next((i for i, (a, b) in enumerate(zip(longer, shorter, strict=False)) if a != b), len(shorter))
    if longer[:place] + longer[place + 1 :] != shorter:
        return None
    where = "in the list" if longer is one else "on the drawings"
    return _Pair(3, 0, f"the same but for a part {where} only: {shown(_shown(longer[place]))}")


def _pair(plain: tuple[str, str], tokens: tuple[tuple[str, ...], tuple[str, ...]]) -> _Pair | None:
    one, other = tokens
    if _DELIMITER.sub("", plain[0]) == _DELIMITER.sub("", plain[1]):
        return _Pair(0, 0, "the same but for delimiters and marks")
    if len(one) == len(other):
        return _one_part(one, other)
    return _one_more(one, other) if abs(len(one) - len(other)) == 1 else None


class _Side:
    """One of the two sets: plain texts and tokens, and its numbers by key and by neighbourhood of the sequence."""

    def __init__(self, numbers: Sequence[str]) -> None:
        self.plain = plain_numbers(numbers)
        self.tokens = [_tokens(plain) for plain in self.plain]
        self.order = sorted(range(len(numbers)), key=lambda index: (self.plain[index], numbers[index]))

    def by_key(self) -> dict[Key, list[int]]:
        found: dict[Key, list[int]] = defaultdict(list)
        for index in self.order:
            for key in dict.fromkeys(_keys(self.plain[index], self.tokens[index])):
                if len(found[key]) < MOST_A_KEY:
                    found[key].append(index)
        return found

    def by_sequence(self) -> dict[Key, list[tuple[int, int]]]:
        found: dict[Key, list[tuple[int, int]]] = defaultdict(list)
        for index in self.order:
            for key, sequence in self.sequences(index):
                found[key].append((sequence, index))
        for values in found.values():
            values.sort()
        return found

    def sequences(self, index: int) -> Iterator[tuple[Key, int]]:
        tokens = self.tokens[index]
        for place, token in enumerate(tokens):
            match = _SEQUENCE.fullmatch(token)
            if match:
                yield (place, tokens[:place] + tokens[place + 1 :], token.replace(match[1], "")), int(match[1])


def _neighbours(values: Sequence[tuple[int, int]], sequence: int) -> Iterator[int]:
    start = bisect_left(values, (sequence - NEAR_SEQUENCE, -1))
    for value, index in values[start : start + 2 * NEAR_SEQUENCE + 2]:
        if value - sequence <= NEAR_SEQUENCE:
            yield index


def near_pairs(first: Sequence[str], second: Sequence[str]) -> tuple[Near, ...]:
    """Return the pairs of near numbers, each number in one pair at most, the nearest pairs first.

    Parameters
    ----------
    first, second : sequence of str
        Line numbers of the list and of the drawings that have no counterpart.
    """
    one, other = _Side(first), _Side(second)
    by_key, by_sequence = one.by_key(), one.by_sequence()
    found: list[tuple[int, int, str, str, int, int, str]] = []
    for place in other.order:
        keys = dict.fromkeys(_keys(other.plain[place], other.tokens[place]))
        candidates = {index for key in keys for index in by_key.get(key, ())}
        for key, sequence in other.sequences(place):
            candidates.update(_neighbours(by_sequence.get(key, ()), sequence))
        for index in candidates:
            pair = _pair((one.plain[index], other.plain[place]), (one.tokens[index], other.tokens[place]))
            if pair is not None:
                found.append((pair.kind, pair.distance, first[index], second[place], index, place, pair.words))
    taken: tuple[set[int], set[int]] = (set(), set())
    pairs = []
    for *_, index, place, words in sorted(found):
        if index not in taken[0] and place not in taken[1]:
            taken[0].add(index)
            taken[1].add(place)
            pairs.append(Near(index, place, words))
    return tuple(pairs)
