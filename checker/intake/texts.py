"""Texts of a list: how they are compared, and how they are shown in a message."""

from __future__ import annotations

import re
import unicodedata

__all__ = ["fold_words", "key_of", "place", "shown", "spared", "tidy"]

LONGEST_SHOWN = 60
_SPARED = re.compile(r"[\s.:_]+")
_SIGNS = str.maketrans(
    {
        "\u0394": " delta ", "\u2206": " delta ", "\u03c1": " rho ", "\u00b5": " mu ", "\u03bc": " mu ",
        "\u03b5": " eps ", "\u03c3": " sigma ", "\u03b3": " gamma ", "\u03ba": " kappa ", "\u03b7": " eta ",
        "\u03bd": " nu ", "#": " no ", "\u2300": " dia ", "_": " ", "\u00f0": "d", "\u0131": "i", "\u0142": "l",
    }
)  # fmt: skip
_SLASHED_O = re.compile(r"(?<![^\W\d_])[\u00d8\u00f8](?![^\W\d_])")
_SMALL_D = re.compile(r"\bd(?=[PZ]\b)")
_NOT_ASCII_WORD = re.compile(r"[^a-z0-9]+")
_TYPOGRAPHIC = str.maketrans(
    {
        "\u2212": "-", "\u2010": "-", "\u2011": "-", "\u2012": "-", "\u2013": "-", "\u2014": "-", "\u2015": "-",
        "\u00a0": " ", "\u202f": " ", "\u2009": " ", "\u2007": " ",
        "\u2033": '"', "\u201c": '"', "\u201d": '"', "\u2019": "'", "\u2032": "'", "\u2044": "/",
    }
)  # fmt: skip


def _escaped(character: str) -> str:
    return character if character.isprintable() else character.encode("unicode_escape").decode("ascii")


def shown(text: str) -> str:
    """Return a text as a message may show it: shortened, and every unprintable character escaped (ESC is ``\\x1b``)."""
    head = text[:LONGEST_SHOWN]
    if not head.isprintable():
        head = "".join(map(_escaped, head))
    return f"'{head}...' ({len(text)} characters)" if len(text) > LONGEST_SHOWN else f"'{head}'"


def place(file: str, row: int | None = None, column: str | None = None) -> str:
    """Return file, row and column header in the words of every message."""
    row_part = "" if row is None else f", row {row}"
    column_part = "" if column is None else f", column {shown(column)}"
    return f"{shown(file)[1:-1]}{row_part}{column_part}"


def tidy(text: str) -> str:
    """Return a text with typographic dashes, blanks and quotation marks made plain and outer blanks gone."""
    return text.translate(_TYPOGRAPHIC).strip()


def fold_words(text: str) -> str:
    """Return a header in the form in which headers are compared: lower case, no accents, no punctuation.

    A Greek delta, and the small d of ``dP`` and ``dZ``, become the word *delta*, which tells a difference from the
    initials of *design pressure*. A slashed O is a letter inside a word and the sign of a diameter by itself.
    """
    if text.isascii():
        plain = _SMALL_D.sub("delta ", text).replace("#", " no ") if "d" in text or "#" in text else text
        return _NOT_ASCII_WORD.sub(" ", plain.lower()).strip()
    folded = _SLASHED_O.sub(" dia ", _SMALL_D.sub("delta ", text)).translate(_SIGNS)
    folded = folded.replace("\u00d8", "o").replace("\u00f8", "o").replace("\u00e6", "ae").replace("\u00c6", "ae")
    folded = unicodedata.normalize("NFKC", folded)
    plain = "".join(c for c in unicodedata.normalize("NFKD", folded.casefold()) if not unicodedata.combining(c))
    return " ".join(re.sub(r"[\W_]+", " ", plain).split())


def spared(text: str) -> str:
    """Return a header as repeats of it are told: without blanks, stops, colons and capitals, its other signs kept."""
    return _SPARED.sub("", text).casefold()


def key_of(text: str) -> str:
    """Return the folded words of a text without blanks, so that ``LineNumber`` and ``Line number`` are one."""
    return fold_words(text).replace(" ", "")
