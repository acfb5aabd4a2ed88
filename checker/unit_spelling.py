"""Fold the many ways one unit is typed into one spelling, without changing what it says."""

from __future__ import annotations

import re
import unicodedata
from functools import lru_cache

from checker.unit_scripts import in_latin

__all__ = ["LOOK_ALIKES", "fold_unit", "in_plain_words"]

LONGEST_UNIT = 40
_SIGNS = {
    "°": "º˚◦∘○ᵒₒ゜",
    "µ": "μ",
    "·": "∙⋅•‧・",
    "*": "×",
    "/": "∕⁄",
    "-": "−–‐‑‒—",
    '"': "″”“„",
    "'": "′’‘",
    "": "\u200b\u200c\u200d\u2060\ufeff\u00ad\u200e",
}
LOOK_ALIKES = str.maketrans({sign: plain for plain, signs in _SIGNS.items() for sign in signs})
"""Signs that look like another one, and signs that cannot be seen, as the one that is meant (none)."""
_RAISED_ZERO = re.compile(r"[⁰ᴼ](?=\s*[CFKRcf\u0421])")
_LETTER = r"[^\W\d_]"
_PER = re.compile(r"\b(?:per|Per|PER)\b|(?<=[a-z])Per(?=[A-Z])")
_INVERSE = re.compile(rf"(?<=[\w)])(?:\s*[·.*]\s*|\s+)({_LETTER}+)\^?-([123])(?!\d)")
_PRODUCT_DOT = re.compile(rf"(?<=[^\W_)])[·.*](?={_LETTER}|\()|(?<=\))[·.*](?={_LETTER}|\()")
_REFERENCE_APART = re.compile(r"\s*[_,]\s*(?=\(?(?:g|a|gauge|gage|abs|absolute)\)?$)", re.IGNORECASE)
_STROKE = re.compile(r"(?<=[^\W_])_(?=[^\W\d_])")
_GAUGE_WORDS = r"rel(?:ati[fv][aeo]?s?)?|eff(?:ecti(?:f|ve))?|man(?:om(?:[eé]tri(?:que|c[ao]))?)?|ü(?:berdruck)?|ue"
_OF_PRESSURE = re.compile(
    rf"(?P<unit>m?bar|[kmh]?pa|psi|(?:kgf?|kp)\s*/\s*cm\s*2)(?:[\s.,(\[_-]+(?:(?:{_GAUGE_WORDS})|(?P<absolute>absolu(?:e|t[aeo]?)?s?"
    r"))|(?<=2)[\s(\[]*(?-i:M))[\s.)\]]*",
    re.IGNORECASE,
)
"""A pressure with a French, Spanish or German word for gauge or absolute, parted from it: ``barrel`` is no pressure."""
_WORDS = {
    "h": "hour hours hr hrs", "min": "minute minutes mins", "s": "second seconds sec secs", "d": "day days",
    "L": "litre litres liter liters ltr ltrs lit", "kg": "kilogram kilograms kilogramme kgs kilo kilos",
    "g": "gram grams gramme grammes gm gms", "t": "tonne tonnes metricton metrictons metrictonne metrictonnes",
    "lb": "pound pounds lbs lbm", "bbl": "barrel barrels bbls", "ft": "foot feet", "m": "metre metres meter meters",
    "100m": "100metre 100metres 100meter 100meters 100mtr 100mtrs", "100ft": "100feet 100foot",
    "km": "kilometre kilometres kilometer kilometers", "mm": "millimetre millimetres millimeter millimeters",
    "m3": "metrecubed metercubed cubicmetre cubicmetres cubicmeter cubicmeters cum cbm",
    "cm2": "sqcm cmsq", "cm2g": "sqcmg", "cm2a": "sqcma", "in2": "sqin sqinch", "in2g": "sqing", "in2a": "sqina",
    "cm3": "cc cucm cubiccentimetre cubiccentimeter", "ft3": "cuft cubicfeet cubicfoot cft",
    "degC": "degreecelsius degreescelsius degreec degreesc degc degcelsius",
    "degF": "degreefahrenheit degreesfahrenheit degreef degreesf",
    "SG": "relativedensity reldensity specificgravity",
    "Pa": "pascal pascals", "kPa": "kilopascal kilopascals", "MPa": "megapascal megapascals",
}  # fmt: skip
_REFERENCES = re.compile(r"(?<=[^\W_])(?:-?(?:(absolute|abs)|gauge|gage)|-([ag]))$", re.IGNORECASE)
_PLAIN = {word: plain for plain, words in _WORDS.items() for word in words.split()}


def fold_unit(text: str) -> str:
    """Return the spelling under which the unit table holds a unit.

    Superscripts become digits, look-alike signs one sign, powers lose their caret, the degree sign becomes ``deg``,
    ``L min^-1`` and ``kg_h`` become quotients, and blanks and product dots vanish. Letters of other scripts are read
    by `in_latin`. The case of letters is kept: ``mPa`` and ``MPa`` differ by a thousand million. A zero is never a
    degree sign: ``0C`` stays ``0C``. Text longer than any unit is returned empty, so that nothing long is ever parsed.
    """
    return _folded(text) if len(text) <= LONGEST_UNIT else ""


@lru_cache(maxsize=8192)
def _folded(text: str) -> str:
    raised = _RAISED_ZERO.sub("°", text.translate(LOOK_ALIKES))
    folded = unicodedata.normalize("NFKC", raised).translate(LOOK_ALIKES).strip()
    folded = folded.replace("deg_", "deg").replace("°", "deg").replace("**", "").replace("degdeg", "deg")
    folded = _INVERSE.sub(lambda match: f"/{match[1]}{match[2] if match[2] != '1' else ''}", folded)
    folded = _PER.sub("/", folded).replace("^", "")
    pressure = _OF_PRESSURE.fullmatch(folded)
    folded = f"{pressure['unit']}{'a' if pressure['absolute'] else 'g'}" if pressure else folded
    folded = _STROKE.sub("/", _REFERENCE_APART.sub("", folded))
    folded = _PRODUCT_DOT.sub("", folded)
    return in_latin(re.sub(r"[\[\]{}().\s]", "", folded))


def in_plain_words(folded: str) -> str:
    """Return a folded unit with its words as symbols: ``litre/minute`` is ``L/min``, ``barabsolute`` is ``bara``."""
    short = _REFERENCES.sub(lambda match: match[2] or ("a" if match[1] else "g"), folded)
    return "/".join(_PLAIN.get(part.casefold(), part) for part in short.split("/"))
