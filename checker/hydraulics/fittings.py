"""The fittings cell of a line list: what it counts, as loss coefficients after Crane."""

from __future__ import annotations

import difflib
import math
import re
from collections.abc import Sequence
from dataclasses import dataclass
from functools import cache

import numpy as np

from checker.hydraulics.arrays import FloatArray
from checker.tables.reading import read_table

__all__ = ["Fitting", "FittingsTable", "known_fittings", "read_fittings"]

NOTHING = frozenset({"none", "nil", "no", "no fittings", "zero", "0", "-", "straight", "straight pipe"})

_SEPARATOR = re.compile(r"[;,/+&\n]|\band\b|\bplus\b", re.IGNORECASE)
_LEADING_COUNT = re.compile(r"^\(?(\d+)\)?\s*(?:x|\u00d7|\*|nos?\b\.?|off\b|pcs\b|ea\b)\s*(.*)$", re.IGNORECASE)
_BARE_COUNT = re.compile(r"^(\d+)\s+(.*)$")
_TRAILING_COUNT = re.compile(r"^(.*?)\s*(?:(?:x|\u00d7|\*)\s*(\d+)|\((\d+)\)|:\s*(\d+))$", re.IGNORECASE)
_COEFFICIENT = re.compile(r"^k\s*=?\s*(\d+(?:\.\d+)?)$", re.IGNORECASE)
_ANGLES = frozenset({"45", "90", "180"})
#: Spelling -> word of the table; an empty word is left out.
_SPELLINGS = {
    "elbows": "elbow", "ell": "elbow", "ells": "elbow", "elb": "elbow", "elbs": "elbow", "bends": "bend",
    "tees": "tee", "t": "tee", "valves": "valve", "vlv": "valve", "vlvs": "valve", "v": "valve", "gates": "gate",
    "globes": "globe", "balls": "ball", "entrances": "entrance", "exits": "exit", "lr": "long", "sr": "short",
    "std": "standard", "deg": "", "degree": "", "degrees": "", "radius": "", "rad": "", "pipe": "", "fitting": "",
    "full": "", "bore": "", "fb": "", "open": "", "flow": "", "welded": "", "bw": "", "buttweld": "", "weld": "",
    "flanged": "", "flg": "", "the": "", "of": "", "from": "", "mitred": "mitre", "mitered": "mitre",
    "miter": "mitre", "3d": "3d", "nonreturn": "non return", "checks": "check", "bellmouthed": "bellmouth",
    "edged": "", "threaded": "standard", "screwed": "standard",
}  # fmt: skip


@dataclass(frozen=True)
class Fitting:
    """One kind of fitting: n in K = n fT, a constant K, whether it stands at an end of the line, the source."""

    name: str
    n: float
    constant_k: float
    end: str
    source: str


@dataclass(frozen=True)
class FittingsTable:
    """What distinct fittings cells count; arrays by text.

    Attributes
    ----------
    n : ndarray
        Sum of n in K = n fT; NaN where the text could not be read.
    k : ndarray
        Sum of constant K, without entrances and exits.
    entrances, exits : ndarray
        Counts.
    entrance_coefficient : ndarray
        Sum of the loss coefficients of the entrances.
    reasons : tuple of str
        Why a text could not be read; empty where it could.
    """

    n: FloatArray
    k: FloatArray
    entrances: FloatArray
    exits: FloatArray
    entrance_coefficient: FloatArray
    reasons: tuple[str, ...]


@cache
def known_fittings() -> dict[str, Fitting]:
    """Return every known fitting by the words it is recognised by, from ``tables/fittings.csv``."""
    found: dict[str, Fitting] = {}
    for row in read_table("fittings"):
        fitting = Fitting(row["name"], float(row["n"]), float(row["constant_k"]), row["end"], row["source"])
        for words in (row["name"], *row["words"].split(";")):
            found[_key(words)] = fitting
    return found


def read_fittings(texts: Sequence[str]) -> FittingsTable:
    """Read fittings cells such as ``4 x elbow 90 LR; 1 x gate valve``; each distinct text once.

    Parameters
    ----------
    texts : sequence of str
        Distinct texts of the column.

    Returns
    -------
    FittingsTable
        A text with one word that is not understood is not read at all: its arrays are NaN, and the reason names the
        words and the closest known ones. A blank text is not known either; ``none`` or ``nil`` counts nothing.

    Notes
    -----
    A lone angle before an elbow is its angle, not a count: ``90 elbow`` is one elbow. An elbow without an angle is
    one of 90 degrees, without a radius the standard one, a tee without run or branch its branch: each the larger loss.

    References
    ----------
    .. [1] Crane, "Flow of Fluids", TP-410, 2009, A-28 to A-30; every value with its source in the table.
    """
    sums = np.full((5, len(texts)), np.nan)
    reasons: list[str] = []
    for column, text in enumerate(texts):
        counted, reason = _read_text(text)
        reasons.append(reason)
        if not reason:
            sums[:, column] = counted
    return FittingsTable(sums[0], sums[1], sums[2], sums[3], sums[4], tuple(reasons))


def _read_text(text: str) -> tuple[tuple[float, float, float, float, float], str]:
    nothing = (0.0, 0.0, 0.0, 0.0, 0.0)
    plain = " ".join(text.split()).casefold().rstrip(".")
    if not plain:
        return nothing, "the cell is blank: write the fittings, or 'none'"
    if plain in NOTHING:
        return nothing, ""
    total = np.zeros(5)
    for part in (piece.strip() for piece in _SEPARATOR.split(text)):
        if not part:
            continue
        values, reason = _read_part(part)
        if reason:
            return nothing, reason
        total += values
    return (float(total[0]), float(total[1]), float(total[2]), float(total[3]), float(total[4])), ""


def _read_part(part: str) -> tuple[tuple[float, ...], str]:
    count, words = _count(part)
    stated = _COEFFICIENT.match(words)
    if stated:
        return (0.0, count * float(stated.group(1)), 0.0, 0.0, 0.0), ""
    fitting = known_fittings().get(_key(words))
    if fitting is None:
        return (math.nan,) * 5, _not_understood(words)
    if fitting.end == "entrance":
        return (0.0, 0.0, count, 0.0, count * fitting.constant_k), ""
    if fitting.end == "exit":
        return (0.0, 0.0, 0.0, count, 0.0), ""
    return (count * fitting.n, count * fitting.constant_k, 0.0, 0.0, 0.0), ""


def _count(part: str) -> tuple[float, str]:
    """Split a part into its count and its words; 1 where no count is written."""
    leading = _LEADING_COUNT.match(part)
    if leading:
        return float(leading.group(1)), leading.group(2)
    trailing = _TRAILING_COUNT.match(part)
    if trailing:
        return float(next(group for group in trailing.groups()[1:] if group)), trailing.group(1)
    bare = _BARE_COUNT.match(part)
    if bare and not _is_angle(bare.group(1), bare.group(2)):
        return float(bare.group(1)), bare.group(2)
    return 1.0, part


def _is_angle(number: str, rest: str) -> bool:
    words = set(_key(rest).split())
    turning = bool(words & {"elbow", "bend", "mitre"})
    return number in _ANGLES and turning and not words & _ANGLES


def _key(words: str) -> str:
    """Words in one spelling and order, so that `elbow 90 LR` and `90deg LR ells` are the same."""
    plain = re.sub(r"(\d)\s*(?:\u00b0|deg(?:rees?)?\b)", r"\1 ", words.casefold())
    plain = re.sub(r"[^a-z0-9. ]+", " ", plain)
    spelt = " ".join(_SPELLINGS.get(word, word) for word in plain.split())
    return " ".join(sorted(set(spelt.split())))


def _not_understood(words: str) -> str:
    known = sorted({fitting.name for fitting in known_fittings().values()})
    spellings = {" ".join(key.split()): fitting.name for key, fitting in known_fittings().items()}
    close = difflib.get_close_matches(_key(words), spellings, n=1, cutoff=0.0)
    nearest = spellings[close[0]] if close else known[0]
    return f"fittings: {words.strip()!r} is not understood; the closest known fitting is {nearest!r}"
