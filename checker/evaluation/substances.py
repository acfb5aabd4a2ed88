"""Which line cases carry water or steam and nothing else, by the words of the list."""

from __future__ import annotations

import re
from collections.abc import Callable
from typing import Any

import numpy as np
from numpy.typing import NDArray

from checker.evaluation.provider import provider
from checker.model import Coded, Gap, Phase
from checker.ruling.tristate import NO, UNKNOWN, YES

__all__ = ["PROVIDERS", "is_water_text", "says_saturated"]

CodeArray = NDArray[np.int8]
PHASES_SAID = {"liquid": Phase.LIQUID, "gas": Phase.GAS, "two-phase": Phase.TWO_PHASE}
_WORD = re.compile(r"[a-z]+")
_FORMULA = re.compile(r"(?<![a-z0-9])h(?:2|\u2082)o(?![a-z0-9])")
_SUBSTANCE = frozenset({"water", "steam", "bfw", "feedwater"})
#: Words that may stand beside them and leave water what it is; anything else may be another substance.
_BESIDE = frozenset(
    {
        "boiler", "feed", "demin", "demineralised", "demineralized", "distilled", "softened", "soft", "cooling",
        "chilled", "potable", "drinking", "fresh", "town", "tap", "plant", "service", "utility", "industrial", "raw",
        "condensate", "hot", "cold", "supply", "return", "hp", "mp", "ip", "lp", "high", "medium", "low", "pressure",
        "saturated", "sat", "superheated", "exhaust", "live", "vent", "closed", "circuit", "pump", "suction",
        "discharge", "header",
    }
)  # fmt: skip
_SATURATED = frozenset({"saturated", "sat", "satd"})
_SUPERHEATED = frozenset({"superheated", "unsaturated", "desuperheated"})


def _words(text: str) -> frozenset[str]:
    return frozenset(_WORD.findall(_FORMULA.sub("water", text.casefold())))


def is_water_text(text: str) -> bool:
    """Return whether a fluid's name means water or steam and nothing else.

    A bare ``condensate`` may be another, and sea water is denser and boils hotter than the bounds for water allow.
    """
    words = _words(text)
    return bool(words & _SUBSTANCE) and words <= _SUBSTANCE | _BESIDE


def says_saturated(text: str) -> bool:
    """Return whether a text calls the fluid saturated."""
    words = _words(text)
    return bool(words & _SATURATED) and not words & _SUPERHEATED


def _by_text(coded: Coded, meaning: Callable[[str], bool], missing: int) -> CodeArray:
    table = np.array([*(YES if meaning(text) else NO for text in coded.texts), missing], dtype=np.int8)
    return table[coded.codes]


def phase_said(*, phase_listed: Coded) -> CodeArray:
    """Return the `Phase` that the list writes, whether or not the row's other values contradict it."""
    table = np.array([*(PHASES_SAID.get(text, Phase.UNKNOWN) for text in phase_listed.texts), -1], dtype=np.int8)
    return table[phase_listed.codes]


def water(*, fluid: Coded, fluid_gap: CodeArray, service_listed: Coded) -> CodeArray:
    """Return 1 where the fluid is water or steam, 0 where it is not, -1 where the list leaves it open.

    The fluid column says; where the list has none, the service does. A service of water or steam says enough where the
    fluid's cell is blank or not applicable; another service leaves that open.
    """
    by_fluid = _by_text(fluid, is_water_text, UNKNOWN)
    by_service = _by_text(service_listed, is_water_text, UNKNOWN)
    blank = np.isin(fluid_gap, (Gap.BLANK, Gap.NOT_APPLICABLE)) & (by_service == YES)
    return np.where((fluid_gap == Gap.NO_COLUMN) | blank, by_service, by_fluid).astype(np.int8)


def saturated(*, fluid: Coded, service_listed: Coded) -> NDArray[np.bool_]:
    """Return True where fluid or service is called saturated."""
    found: Any = (_by_text(fluid, says_saturated, NO) == YES) | (_by_text(service_listed, says_saturated, NO) == YES)
    return np.asarray(found, dtype=np.bool_)


PROVIDERS = (provider(phase_said), provider(water), provider(saturated))
