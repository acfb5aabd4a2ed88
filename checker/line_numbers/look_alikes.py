"""Signs that look like another one in a line number, and signs that cannot be seen.

The letters are those capitals and small letters of the Cyrillic and Greek alphabets that are drawn like a Latin one
(compare Unicode Technical Standard 39, confusables), *from memory*, so far as they stand on a keyboard.
"""

from __future__ import annotations

import re

__all__ = ["HYPHENS", "INCH_MARKS", "INVISIBLE", "IN_LATIN"]

HYPHENS = (
    "\u00ad\u02d7\u058a\u05be\u1806\u2010\u2011\u2012\u2013\u2014\u2015\u2043\u2212\u2e3a\u2e3b\u301c\ufe58\ufe63\uff0d"
)
INCH_MARKS = (
    "'\"`\u00b4\u02b9\u02ba\u02bc\u02dd\u2018\u2019\u201a\u201b\u201c\u201d\u201e\u201f\u2032\u2033\u2035\u2036\u3003"
    "\uff02\uff07"
)
#: Formats, controls and joiners: nothing of them is seen. A soft hyphen may be seen as a hyphen and counts as one.
INVISIBLE = re.compile(
    "[\x00-\x08\x0e-\x1b\x7f-\x84\x86-\x9f\u034f\u061c\u115f\u1160\u17b4\u17b5\u180b-\u180f\u200b-\u200f\u202a-\u202e"
    "\u2060-\u206f\u3164\ufe00-\ufe0f\ufeff\uffa0\ufff0-\ufffb\U000e0000-\U000e0fff]"
)
_CYRILLIC = (
    "\u0410\u0412\u0415\u041a\u041c\u041d\u041e\u0420\u0421\u0422\u0425\u0430\u0435\u043e\u0440"
    "\u0441\u0445\u0443\u0456\u0406\u0455\u0405\u0458\u0408\u0423\u051b\u051c\u0461",
    "ABEKMHOPCTXaeopcxyiIsSjJYqWw",
)
_GREEK = (
    "\u0391\u0392\u0395\u0396\u0397\u0399\u039a\u039c\u039d\u039f\u03a1\u03a4\u03a5\u03a7\u03bf\u03f3\u03bd",
    "ABEZHIKMNOPTYXojv",
)
IN_LATIN = {ord(letter): latin for letters in (_CYRILLIC, _GREEK) for letter, latin in zip(*letters, strict=True)}
