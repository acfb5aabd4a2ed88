"""Units that the table does not hold, asked of pint itself after a strict look at their characters."""

from __future__ import annotations

import re
from functools import cache
from typing import TYPE_CHECKING

from checker.unit_table import Unit

if TYPE_CHECKING:
    import pint as pint_types

__all__ = ["unit_of_pint"]

_PINT_DIMENSION = {
    "pressure": "[pressure]",
    "pressure difference": "[pressure]",
    "stress": "[pressure]",
    "pressure gradient": "[pressure]/[length]",
    "temperature": "[temperature]",
    "mass flow": "[mass]/[time]",
    "volume flow": "[volume]/[time]",
    "density": "[mass]/[volume]",
    "viscosity": "[viscosity]",
    "molar mass": "[mass]/[substance]",
    "length": "[length]",
    "diameter": "[length]",
    "velocity": "[speed]",
    "surface tension": "[force]/[length]",
    "time": "[time]",
    "momentum flux": "[pressure]",
}
_PLAIN_UNIT = re.compile(r"[A-Za-zµ_]{1,24}[23]?([/*][A-Za-zµ_]{1,24}[23]?){0,3}")
_SHORT = ("kg", "lb", "ft", "in", "yd", "mi", "m", "s", "h", "d", "N", "J", "W")
_AMBIGUOUS = ("ton", "tons", "Ton", "Tons", "TON", "TONS", "cwt", "gallon", "gal", "barrel")


def _plain_names(folded: str, registry: pint_types.UnitRegistry[float]) -> bool:
    """Return whether no name is read through a prefix but kilo: ``nm3/h`` and ``mt/h`` are no nano and no milli."""
    names = [re.sub(r"[23]$", "", name) for name in re.split(r"[/*]", folded)]
    return all(
        name not in _AMBIGUOUS
        and any(prefix in ("", "kilo") for prefix, _, _ in registry.parse_unit_name(name))
        and (len(name) > 2 or name in _SHORT)
        for name in names
    )


@cache
def _registry() -> pint_types.UnitRegistry[float]:
    import pint

    return pint.UnitRegistry()


def unit_of_pint(folded: str, dimension: str) -> Unit | None:
    """Ask pint for a spelling the table does not hold; None where pint does not know it either."""
    if dimension not in _PINT_DIMENSION or not _PLAIN_UNIT.fullmatch(folded):
        return None
    import pint

    registry = _registry()
    if not _plain_names(folded, registry):
        return None
    try:
        one, two = (registry.Quantity(number, re.sub(r"([23])", r"**\1", folded)) for number in (1.0, 2.0))
        if not one.check(_PINT_DIMENSION[dimension]):
            return None
        scale = float(one.to_base_units().magnitude)
        return Unit(folded, dimension, scale, 0.0, "") if two.to_base_units().magnitude == 2.0 * scale else None
    except (pint.errors.PintError, AttributeError, TypeError, ValueError):
        return None
