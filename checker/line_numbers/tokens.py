"""Line numbers parted at the delimiters that most numbers of the list carry."""

from __future__ import annotations

import re
from collections.abc import Sequence
from dataclasses import dataclass
from itertools import count, repeat
from operator import contains

import numpy as np
from numpy.typing import NDArray

from checker.line_numbers.folding import plain_numbers
from checker.model import Coded

__all__ = [
    "HEAD", "MOST_DISTINCT", "SHARE_OF_SHAPE", "TAIL", "WHOLE", "Group", "Piece", "TokenTable", "coded", "pieces_of",
    "share_of_shape", "table_of_tokens",
]  # fmt: skip

IntArray = NDArray[np.int32]

DELIMITERS = "-/_. "
SHARE_OF_DELIMITER = 0.5
LEAST_NUMBERS, LEAST_SHARE = 3, 0.1
"""A second layout is one where this many numbers, and this share of all, have as many tokens."""
MOST_TOKENS = 24
_FRACTION = r"(?:1/2|[13]/4|[1357]/8)"
_WHOLE_AND_FRACTION = re.compile(rf"(?<![A-Z\d/.])(\d{{1,2}})[- .]({_FRACTION})(?![\d/])")
_ONLY_FRACTION = re.compile(r"(?<![A-Z\d/])(1(?=/2)|[13](?=/4)|[1357](?=/8))/([248])(?![\d/])")
_DECIMAL = re.compile(r"(?<![\d.])(\d{0,2})\.(\d{1,4})(?=\")")
_KEPT = {"\x01": " ", "\x02": "/", "\x03": "."}
_DIGITS_FIRST, _LETTERS_FIRST = r"(\d[\d.]*\"?)([A-Z&]+)", r"([A-Z&]+)(\d[\dA-Z]*)"
SHARE_OF_SHAPE = 0.8
MOST_DISTINCT = 2_000
"""A size, service, class or code is one of few; a token of more values than this is none of them."""
WHOLE, HEAD, TAIL = 0, 1, 2


@dataclass(frozen=True, slots=True)
class Group:
    """The numbers of one count of tokens: their places among the distinct numbers, and their tokens by position."""

    members: IntArray
    columns: tuple[Coded, ...]


@dataclass(frozen=True, slots=True)
class TokenTable:
    """Distinct line numbers in plain signs, which of them each line has, their delimiters, and their tokens.

    `groups` are those that enough numbers have, `rare` the others.
    """

    numbers: tuple[str, ...]
    of_text: IntArray
    delimiters: str
    groups: tuple[Group, ...]
    rare: tuple[Group, ...]


@dataclass(frozen=True, slots=True)
class Piece:
    """A whole token, or the head or tail of one that glues digits to letters, over the numbers of a group."""

    position: int
    part: int
    values: Coded


def coded(texts: Sequence[str]) -> Coded:
    """Return texts as codes, an empty text as missing."""
    places = dict(zip(dict.fromkeys(texts), count(), strict=False))
    codes = np.fromiter(map(places.__getitem__, texts), dtype=np.int32, count=len(texts))
    if "" in places:
        codes[codes == places[""]] = -1
    return Coded(codes, tuple(places))


def _protected(text: str) -> str:
    """Return joined numbers in which the signs inside a size (``1-1/2``, ``3/4``, ``1.5"``) part no tokens."""
    if "/" in text:
        text = _WHOLE_AND_FRACTION.sub(lambda match: f"{match[1]}\x01{match[2].replace('/', chr(2))}", text)
        text = _ONLY_FRACTION.sub("\\1\x02\\2", text)
    return _DECIMAL.sub("\\1\x03\\2", text) if "." in text else text


def _restored(column: Coded) -> Coded:
    together = "".join(column.texts)
    if not any(sign in together for sign in _KEPT):
        return column
    texts = list(column.texts)
    for sign, meant in _KEPT.items():
        texts = [text.replace(sign, meant) for text in texts]
    return Coded(column.codes, tuple(texts))


def _delimiters(numbers: Sequence[str]) -> str:
    least = max(1.0, SHARE_OF_DELIMITER * len(numbers))
    return "".join(sign for sign in DELIMITERS if sum(map(contains, numbers, repeat(sign))) >= least)


def _group(numbers: Sequence[str], members: IntArray, tokens: int, delimiter: str) -> Group:
    mine = numbers if members.size == len(numbers) else [numbers[member] for member in members]
    flat = delimiter.join(mine).split(delimiter) if delimiter else list(mine)
    return Group(members, tuple(_restored(coded(flat[position::tokens])) for position in range(tokens)))


def _groups(numbers: Sequence[str], delimiter: str) -> tuple[tuple[Group, ...], tuple[Group, ...]]:
    """Return the groups that enough numbers have, the largest first, and the others."""
    if not numbers:
        return (), ()
    tokens = np.ones(len(numbers), dtype=np.int32)
    if delimiter:
        tokens += np.fromiter(map(str.count, numbers, repeat(delimiter)), dtype=np.int32, count=len(numbers))
    counts = np.bincount(tokens)
    order = sorted(np.flatnonzero(counts[: MOST_TOKENS + 1]).tolist(), key=lambda each: (-counts[each], -each))
    least = max(LEAST_NUMBERS, LEAST_SHARE * len(numbers))
    groups = [_group(numbers, np.flatnonzero(tokens == each).astype(np.int32), each, delimiter) for each in order]
    common = [each for place, each in enumerate(groups) if not place or each.members.size >= least]
    return tuple(common), tuple(groups[len(common) :])


def table_of_tokens(texts: Sequence[str]) -> TokenTable:
    """Part the line numbers of a list.

    Parameters
    ----------
    texts : sequence of str
        Line numbers as written, one a line.

    Returns
    -------
    TokenTable
        Delimiters are those that at least half of the distinct numbers carry; a group is one count of tokens that
        enough numbers have. An empty token states nothing.
    """
    plain = coded(plain_numbers(texts))
    numbers = tuple(text for text in plain.texts if text)
    if "" in plain.texts:
        gap = plain.texts.index("")
        codes = np.where(plain.codes > gap, plain.codes - 1, plain.codes).astype(np.int32)
    else:
        codes = plain.codes
    protected = _protected("\n".join(numbers)).split("\n") if numbers else []
    delimiters = _delimiters(protected)
    joined = "\n".join(protected)
    for sign in delimiters[1:]:
        joined = joined.replace(sign, delimiters[0])
    parted = joined.split("\n") if numbers else []
    common, rare = _groups(parted, delimiters[:1])
    return TokenTable(numbers, codes, delimiters, common, rare)


def share_of_shape(values: Coded, shape: str) -> float:
    """Return in what share of the numbers a token has a shape; of its distinct values where these are many."""
    if len(values.texts) > MOST_DISTINCT:
        stated = [text for text in values.texts if text]
        return len(re.findall(rf"^(?:{shape})$", "\n".join(stated), re.MULTILINE | re.ASCII)) / max(1, len(stated))
    known = values.codes[values.codes >= 0]
    match = re.compile(shape, re.ASCII).fullmatch
    fits = np.array([match(text) is not None for text in values.texts], dtype=np.bool_)
    return float(fits[known].mean()) if known.size else 0.0


def _half(column: Coded, texts: Sequence[str]) -> Coded:
    half = coded(texts)
    return Coded(np.where(column.codes < 0, -1, half.codes[column.codes]).astype(np.int32), half.texts)


def _split_in_two(column: Coded) -> tuple[Coded, Coded] | None:
    """Return head and tail of tokens that glue digits to letters, None where too few of them do."""
    for shape in (_DIGITS_FIRST, _LETTERS_FIRST):
        if share_of_shape(column, shape) >= SHARE_OF_SHAPE:
            matches = list(map(re.compile(shape, re.ASCII).fullmatch, column.texts))
            head, tail = ([match[part] if match else "" for match in matches] for part in (HEAD, TAIL))
            return _half(column, head), _half(column, tail)
    return None


def pieces_of(group: Group) -> list[Piece]:
    """Return the tokens of a group, and their halves where most of a position glue digits to letters."""
    pieces = []
    for position, column in enumerate(group.columns):
        pieces.append(Piece(position, WHOLE, column))
        halves = _split_in_two(column)
        if halves:
            pieces += [Piece(position, HEAD, halves[0]), Piece(position, TAIL, halves[1])]
    return pieces
