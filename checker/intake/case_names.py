"""Names of cases: the canonical word for each spelling, and the kind of case that a name means."""

from __future__ import annotations

import re
from functools import lru_cache

from checker.intake.texts import fold_words
from checker.model import CaseKind

__all__ = ["canonical_case", "case_kind", "split_case"]

_SPELLINGS = {
    "minimum": "min; minimum; mini; turndown; turn down",
    "normal": "norm; normal; nor; nrm",
    "maximum": "max; maximum; maxi; peak",
    "rated": "rated",
    "relief": "relief; relieving; psv",
    "start-up": "start up; startup",
    "shut-down": "shut down; shutdown",
    "blowdown": "blow down; blowdown",
    "depressuring": "depressuring; depressurising; depressurizing; depressurisation; depressurization",
    "steam-out": "steam out; steamout; steaming out",
    "regeneration": "regeneration; regen",
    "dry-out": "dry out; dryout",
    "emergency": "emergency",
    "pigging": "pigging",
    "loading": "loading; ship loading",
    "recirculation": "recirculation; recirc",
    "winter": "winter",
    "summer": "summer",
    "upset": "upset",
    "alternate": "alternate; alternative; alt",
    "start of run": "start of run; sor",
    "end of run": "end of run; eor",
    "future": "future",
}
_INTERMITTENT = re.compile(
    r"relie(f|ving)|\bpsv\b|start-? ?up|shut-? ?down|blow-? ?down|depress|steam(ing)?-? ?out|regen|dry-? ?out|"
    r"emergency|pigging|flush|purg(e|ing)|upset|commissioning|drain(ing)?\b|evacuation"
)
_MECHANICAL = re.compile(r"(mechanical|mech)( design)?|design|hydro ?test|hydrostatic test|pressure test|test")
_NUMBERED = re.compile(r"(design|case|alternate|alt|alternative|relief) ([0-9]{1,3}|[a-z])")


@lru_cache(maxsize=1)
def _canonical() -> dict[str, str]:
    return {text.strip(): name for name, texts in _SPELLINGS.items() for text in texts.split(";")}


def canonical_case(text: str) -> str:
    """Return the canonical name of a case, or its folded words where it is no usual one."""
    words = fold_words(text)
    words = re.sub(r" (case|flow)$|^case (?=[a-z]{2})", "", words) or words
    return _canonical().get(words, words)


def case_kind(name: str) -> CaseKind:
    """Return what kind of case a canonical name means; a name that says nothing is a continuous case."""
    if not name:
        return CaseKind.UNKNOWN
    if _MECHANICAL.fullmatch(fold_words(name)):
        return CaseKind.MECHANICAL_ONLY
    return CaseKind.INTERMITTENT if _INTERMITTENT.search(name) else CaseKind.CONTINUOUS


def _case_of_words(words: str) -> str:
    return _canonical().get(words, words if _NUMBERED.fullmatch(words) else "")


def split_case(words: str) -> list[tuple[str, str]]:
    """Return every way to split the folded words of a header into a case and the rest."""
    parts = words.split()
    splits = []
    for count in (3, 2, 1):
        for start in range(len(parts) - count + 1):
            case = _case_of_words(" ".join(parts[start : start + count]))
            rest = " ".join(parts[:start] + parts[start + count :])
            if case and rest:
                splits.append((case, rest))
    return splits
