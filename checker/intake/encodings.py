"""Which encoding a text without a byte-order mark is in, where it is not UTF-8.

Strictly decoded candidates only. Western ones differ in a few signs, so the trade's own signs tell them apart: a
degree sign before C, a square or a cube, a micro sign before a unit. Long runs of bytes beyond ASCII are words in
another script, for which charset-normalizer is asked. Where neither speaks clearly, Windows-1252 is read and the
reader is told what to look at.
"""

from __future__ import annotations

import re

__all__ = ["SIGNS", "tell_encoding", "unmarked_wide_encoding"]

SIGNS = "signs such as the degree sign, accents and words in other scripts"
_WESTERN = ("cp1252", "cp850", "mac_roman")
_OTHER_SCRIPTS = ("cp1251", "gb18030", "cp932", "shift_jis", "euc_kr", "big5", "cp1253", "koi8_r")
_NAMES = {
    "cp1252": "Windows-1252", "cp850": "code page 850 (DOS)", "mac_roman": "Mac Roman",
    "cp1251": "Windows-1251 (Cyrillic)", "gb18030": "GB 18030 (Chinese)", "cp932": "Shift-JIS (Japanese)",
    "shift_jis": "Shift-JIS (Japanese)", "euc_kr": "EUC-KR (Korean)", "big5": "Big5 (Chinese)",
    "cp1253": "Windows-1253 (Greek)", "koi8_r": "KOI8-R (Cyrillic)",
}  # fmt: skip
_TRADE_SIGNS = re.compile(
    "\u00b0 ?[CFKRcf]\\b|\u00ba ?[CF]\\b|\\b[cdmk]?m[\u00b2\u00b3]|\u00b5(?:m|Pa)|\\d[\u00bc\u00bd\u00be]"
    "|\u0394[PTp]|\u00d8 ?\\d"
)
_OTHER_SCRIPT_RUN = re.compile(rb"[\x80-\xff]{4,}")
_SAMPLE = 200_000
_WELL_APART = 0.02
_WIDE_SAMPLE = 4_096
_MOSTLY, _HARDLY = 0.6, 0.05


def unmarked_wide_encoding(content: bytes) -> str:
    """Return the UTF-16 or UTF-32 that the pattern of NUL bytes shows, empty where there is none."""
    sample = content[: _WIDE_SAMPLE - len(content) % 4] if len(content) < _WIDE_SAMPLE else content[:_WIDE_SAMPLE]
    count = len(sample) // 4
    if not count:
        return ""
    nuls = [sample[place::4][:count].count(0) / count for place in range(4)]
    patterns = {
        "utf-32-le": (0, 1, 1, 1),
        "utf-32-be": (1, 1, 1, 0),
        "utf-16-le": (0, 1, 0, 1),
        "utf-16-be": (1, 0, 1, 0),
    }
    for name, pattern in patterns.items():
        fits = (share >= _MOSTLY if zero else share <= _HARDLY for share, zero in zip(nuls, pattern, strict=True))
        if all(fits):
            return name
    return ""


def _decodes(content: bytes, encoding: str) -> str | None:
    try:
        return content.decode(encoding)
    except UnicodeDecodeError:
        return None


def _western(content: bytes) -> str:
    """Return the one Western encoding in which the most signs of the trade stand, empty where none is alone."""
    scores: dict[str, int] = {}
    for encoding in _WESTERN:
        text = _decodes(content, encoding)
        if text is not None:
            scores[encoding] = len(_TRADE_SIGNS.findall(text[:_SAMPLE]))
    best = max(scores.values(), default=0)
    leaders = [encoding for encoding, score in scores.items() if score == best]
    return leaders[0] if best and len(leaders) == 1 else ""


def _other_script(content: bytes) -> str:
    """Return the encoding of a text whose words are in another script, empty where it is not well apart."""
    if len(_OTHER_SCRIPT_RUN.findall(content[:_SAMPLE])) < 2:
        return ""
    from charset_normalizer import from_bytes

    matches = list(from_bytes(content[:_SAMPLE], cp_isolation=[*_OTHER_SCRIPTS, "cp1252"]))
    if not matches or matches[0].encoding not in _OTHER_SCRIPTS:
        return ""
    if len(matches) > 1 and not _same(matches[0].encoding, matches[1].encoding, content):
        apart = matches[1].chaos - matches[0].chaos
        if apart < _WELL_APART:
            return ""
    return matches[0].encoding if _decodes(content, matches[0].encoding) is not None else ""


def _same(first: str, second: str, content: bytes) -> bool:
    text = _decodes(content, first)
    return text is not None and text == _decodes(content, second)


def tell_encoding(content: bytes, position: int) -> tuple[str, str]:
    """Return the encoding of bytes that are not UTF-8 from a position on, and the note on it."""
    told = _other_script(content) or _western(content)
    if told and told != "cp1252":
        return told, (
            f"Not UTF-8 (byte {position}): read as {_NAMES[told]}, told by its signs; check {SIGNS}, or save as UTF-8."
        )
    return "cp1252", f"Not UTF-8 (byte {position}): read as Windows-1252; check {SIGNS}, or save as UTF-8."
