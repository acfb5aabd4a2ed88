"""Words of the phase column in the languages that lists come in, as one of three phases; common practice."""

from __future__ import annotations

import re
import unicodedata

__all__ = ["PHASES", "phase_word"]

_LIQUID = (
    "l liq liquid liquids liquide liquides liquido liquida liquidos flussig fluessig flussigkeit fluessigkeit "
    "flussige vloeistof vloeibaar vaeske vaske жидкость жидкая жидкии ж 液 液体 液體 液相 液态"
)
_GAS = (
    "v g vap vapour vapor vapeur vapeurs vapores gas gaz gases gazeux gazeuse gaseous gaseoso gaseosa gasformig "
    "gasfoermig dampf dampfformig dampffoermig steam газ газы газообразная пар \u0433 "
    "气 氣 气体 氣體 气相 气态 汽 蒸汽 蒸气"
)
_TWO_PHASE = (
    "m mixed mix mixte 2ph 2phase twophase vl lv lg gl tp multiphase mp 2p lplusg vplusl "
    "diphasique biphasique bifasico bifasica bifase zweiphasig "
    "двухфазная двухфазныи двухфазное 两相 兩相 气液 液气 气液两相 混相"
)
_OF_PHASE = ("phase", "phasen", "fase")
_LIQUID_SIDES = "l liq liquid liquide liquido ж жидкость".split()
_GAS_SIDES = "g v gas gaz vap vapour vapor vapeur \u0433 газ пар".split()
_JOINTS = ("plus", "and", "et", "und", "y", "e")


_DOUBT = frozenset("?~\u00bf\u2248\u2245\u223c\u2243\uff5e\uff1f")
_NOTE = re.compile(r"(?<=\w)\s*[(\[]\s?(?:see )?notes?\.? ?\d{1,2}(?: ?[,&] ?\d{1,2}){0,4}\s?[)\]]\s*$", re.IGNORECASE)


def phase_word(text: str) -> str:
    """Return the letters and figures of a text, small and without accents; ``plus`` for the sign in a long one.

    A footnote (``V (Note 1)``) is left out; a text with a mark of doubt (``V?``, ``~V``) has no word.
    """
    if not _DOUBT.isdisjoint(text):
        return ""
    text = _NOTE.sub("", text)
    plus = "" if len(text.strip()) <= 3 else "plus"
    plain = unicodedata.normalize("NFKD", text.casefold()).replace("+", plus)
    return "".join(character for character in plain if character.isalnum())


def _words() -> dict[str, str]:
    single = {"liquid": _LIQUID, "gas": _GAS, "two-phase": _TWO_PHASE}
    words = {word: name for name, listed in single.items() for word in listed.split()}
    long = {word: name for word, name in words.items() if len(word) > 1 and word.isascii()}
    words |= {f"{word}{of}": name for word, name in long.items() for of in _OF_PHASE}
    words |= {f"{of}{word}": name for word, name in long.items() for of in _OF_PHASE}
    pairs = [(one, other) for one in _LIQUID_SIDES for other in _GAS_SIDES if one.isascii() == other.isascii()]
    for one, other in (*pairs, *((other, one) for one, other in pairs)):
        joints = ("", *_JOINTS) if min(len(one), len(other)) > 1 else ("",)
        words |= {f"{one}{joint}{other}": "two-phase" for joint in joints}
    return words


#: Phase of every word, after `phase_word`.
PHASES = _words()
