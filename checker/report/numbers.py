"""How numbers are shown: four significant figures, and the unit in which the trade reads them."""

from __future__ import annotations

import math

__all__ = ["MISSING", "count", "fraction", "in_shown_unit", "percentage", "shown_unit", "significant", "utilisation"]

MISSING = "\u2013"
SIGNIFICANT_FIGURES = 4
LEAST_PLAIN = 1e-3
MOST_PLAIN = 1e6
NARROW_SPACE = "\u202f"
TIMES = "\u00d7"
_SHOWN_UNITS = {
    "pressure_gradient": ("bar/100 m", 1e-3),
    "pressure_inlet": ("bar(a)", 1e-5),
    "pressure_outlet": ("bar(a)", 1e-5),
    "dp_friction": ("bar", 1e-5),
    "dp_fittings": ("bar", 1e-5),
    "dp_elevation": ("bar", 1e-5),
    "dp_acceleration": ("bar", 1e-5),
    "dp_total": ("bar", 1e-5),
    "pressure_loss": ("bar", 1e-5),
    "surge_rise": ("bar", 1e-5),
}
_SUPERSCRIPTS = str.maketrans("-0123456789", "⁻⁰¹²³⁴⁵⁶⁷⁸⁹")


def significant(value: float) -> str:
    """Return a number with four significant figures; a dash where it is missing.

    Very small and very large numbers are written with a power of ten; digits before the point are grouped in threes
    from ten thousand up.
    """
    if math.isnan(value):
        return MISSING
    if math.isinf(value):
        return "infinite" if value > 0 else "minus infinite"
    if value == 0.0:
        return "0"
    if not LEAST_PLAIN <= abs(value) < MOST_PLAIN:
        return _power_of_ten(value)
    return _plain(value)


def utilisation(value: float) -> str:
    """Return a utilisation with two decimals, or more where two would put it on the limit it is not on."""
    if math.isnan(value):
        return MISSING
    if math.isinf(value):
        return "infinite"
    for decimals in (2, 3, 4, 5, 6):
        shown = f"{value:.{decimals}f}"
        if float(shown) != 1.0 or abs(value - 1.0) <= 1e-9:
            return shown
    return f"{value:.9f}"


def percentage(part: float, whole: float) -> str:
    """Return a part of a whole in per cent, one decimal; never 100 % or 0 % where it is only near."""
    if whole <= 0:
        return MISSING
    share = 100.0 * part / whole
    if part < whole and share >= 99.95:
        return "over 99.9 %"
    if part > 0 and share < 0.05:
        return "under 0.1 %"
    return f"{share:.1f} %"


def fraction(value: float) -> str:
    """Return a fraction in per cent, a dash where it is missing."""
    return MISSING if math.isnan(value) else f"{100.0 * value:.1f} %"


def count(value: int) -> str:
    """Return a whole number, its digits grouped in threes from ten thousand up."""
    return f"{value:,}".replace(",", NARROW_SPACE) if abs(value) >= 10_000 else str(value)


def shown_unit(name: str, si_unit: str) -> tuple[str, float]:
    """Return the unit in which a hydraulic result is shown, and the factor from SI to it."""
    return _SHOWN_UNITS.get(name, (si_unit, 1.0))


def in_shown_unit(name: str, si_unit: str, value: float) -> str:
    """Return a hydraulic result as shown, with its unit where it has one."""
    unit, factor = shown_unit(name, si_unit)
    number = significant(value * factor)
    return number if number == MISSING or unit in {"", "-", "1"} else f"{number} {unit}"


def _plain(value: float) -> str:
    rounded = float(f"{value:.{SIGNIFICANT_FIGURES - 1}e}")
    decimals = max(0, SIGNIFICANT_FIGURES - 1 - math.floor(math.log10(abs(rounded))))
    whole, point, decimal = f"{rounded:.{decimals}f}".partition(".")
    grouped = f"{int(whole):,}".replace(",", NARROW_SPACE) if abs(rounded) >= 10_000 else whole
    return grouped + point + decimal


def _power_of_ten(value: float) -> str:
    mantissa, exponent = f"{value:.{SIGNIFICANT_FIGURES - 1}e}".split("e")
    return f"{mantissa} {TIMES} 10{str(int(exponent)).translate(_SUPERSCRIPTS)}"
