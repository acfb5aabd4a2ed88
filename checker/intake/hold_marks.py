"""The column of open items (``Hold``): which of its cells mark one."""

from __future__ import annotations

import re

__all__ = ["marks_hold"]

#: These say that there is no open item; every other mark says that there is one.
_NO_MARK = frozenset({"n", "no", "0", "none", "nil", "na", "not applicable", "false", "f", "no hold", "not on hold"})
_SIGNS_ALONE = re.compile(r"[\s.,;:_/\-\u2010-\u2015\u2212]+")


def marks_hold(text: str) -> bool:
    """Return whether a cell of the column of open items marks one: any mark (Y, 3, H1, X, a tick) but a plain no."""
    word = _SIGNS_ALONE.sub(" ", text.casefold()).strip()
    return bool(word) and word.replace("n a", "na") not in _NO_MARK
