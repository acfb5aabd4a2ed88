"""Fold the many ways one unit is typed into one spelling, without changing what it says."""

from __future__ import annotations

import re
import unicodedata

__all__ = ["fold_unit"]

LONGEST_UNIT = 40
_LOOK_ALIKES = str.maketrans(
    {
        "º": "°", "˚": "°", "◦": "°", "∘": "°",
        "μ": "µ", "∙": "·", "⋅": "·", "•": "·",
        "−": "-", "–": "-", "‐": "-", "‑": "-",
        "″": '"', "”": '"', "“": '"', "′": "'", "’": "'",
    }
)  # fmt: skip


def fold_unit(text: str) -> str:
    """Return the spelling under which the unit table holds a unit.

    Superscripts become digits, look-alike signs one sign, powers lose their caret, the degree sign becomes ``deg``
    and blanks and product dots vanish. The case of letters is kept: ``mPa`` and ``MPa`` differ by a thousand million.
    Text longer than any unit is returned empty, so that nothing long is ever parsed.
    """
    if len(text) > LONGEST_UNIT:
        return ""
    folded = unicodedata.normalize("NFKC", text.translate(_LOOK_ALIKES)).translate(_LOOK_ALIKES).strip()
    folded = re.sub(r"\bper\b", "/", folded)
    folded = folded.replace("°", "deg").replace("**", "").replace("^", "")
    folded = re.sub(r"(?<=[A-Za-zµ0-9)])[·.*](?=[A-Za-zµ(])", "", folded)
    folded = re.sub(r"\s+", "", folded)
    return re.sub(r"[\[\]().]", "", folded)
