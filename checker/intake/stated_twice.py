"""One value that a cell states twice, in two units: ``50 °C (122 °F)``, ``5 barg/72.5 psig``."""

from __future__ import annotations

import re

from checker.units import Unit

__all__ = ["agree", "two_statements"]

_TWICE = re.compile(
    r"(?P<first>[-+]?\s?[.\d][^()\[\]]*?)\s*[(\[]\s*(?P<second>[-+]?\s?[.\d][^()\[\]]*?[^()\[\]\s\d.,])\s*[)\]]",
    re.ASCII,
)
_PARTED = re.compile(
    r"(?P<first>[-+]?\s?[.\d][^()\[\]]*?[^()\[\]\s\d.,])\s*[/=|]\s*(?P<second>[-+]?\s?[.\d][^()\[\]]*?[^()\[\]\s\d.,])",
    re.ASCII,
)
_DECIMALS = re.compile(r"[-+]?\s?[\d' ]*(?:[.,](\d+))?(?![\d.,eE])", re.ASCII)
_ROUNDING = 1e-9


def two_statements(plain: str) -> tuple[str, str] | None:
    """Return the two texts of a cell that states a number, and behind it in brackets a number with a unit.

    With a stroke or an equals sign between them in place of the brackets both must have a unit.
    """
    match = _TWICE.fullmatch(plain) or _PARTED.fullmatch(plain)
    return (match["first"], match["second"]) if match else None


def _half_a_step(text: str, unit: Unit) -> float:
    """Return half of the last figure of a number in SI: what it may have been rounded by."""
    match = _DECIMALS.match(text)
    return 0.5 * 10.0 ** -len(match[1] or "") * abs(unit.scale) if match else 0.0


def agree(texts: tuple[str, str], values: tuple[float, float], units: tuple[Unit, Unit]) -> bool:
    """Return whether two statements are one value: one of them the other, converted and rounded to its last figure.

    Parameters
    ----------
    texts : (str, str)
        The statements as written.
    values : (float, float)
        Their values in SI.
    units : (Unit, Unit)
        Their units.
    """
    rounded = max(_half_a_step(text, unit) for text, unit in zip(texts, units, strict=True))
    return abs(values[0] - values[1]) <= rounded + _ROUNDING * max(map(abs, values))
