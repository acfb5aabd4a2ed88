"""Names of cases: the canonical word for each spelling, and the kind of case that a name means."""

from __future__ import annotations

import re
from collections.abc import Callable
from functools import lru_cache

from checker.intake.texts import fold_words, tidy
from checker.model import CaseKind

__all__ = ["canonical_case", "case_kind", "split_case", "split_mechanical_case"]

_SPELLINGS = {
    "minimum": "min; minimum; mini; minimal; minimale; minimo; minima; minimaux; turndown; turn down; мин; "
    "минимальный; минимальная; минимальное; 最小; 最低",
    "normal": "norm; normal; nor; nrm; normale; normaux; нормальный; нормальная; нормальное; 正常",
    "maximum": "max; maximum; maxi; maximal; maximale; maximo; maxima; massimo; massima; maximaux; peak; макс; "
    "максимальный; максимальная; максимальное; 最大; 最高",
    "rated": "rated",
    "relief": "relief; relieving; psv",
    "start-up": "start up; startup; demarrage; anfahren; arranque; partida; avviamento; oppstart",
    "shut-down": "shut down; shutdown; arret; abfahren; parada",
    "shut-in": "shut in; shutin; closed in",
    "settle-out": "settle out; settling out; settleout",
    "blowdown": "blow down; blowdown",
    "depressuring": "depressuring; depressurising; depressurizing; depressurisation; depressurization",
    "steam-out": "steam out; steamout; steaming out",
    "regeneration": "regeneration; regen",
    "dry-out": "dry out; dryout",
    "emergency": "emergency",
    "pigging": "pigging",
    "loading": "loading; ship loading",
    "recirculation": "recirculation; recirc",
    "winter": "winter; hiver; invierno; inverno",
    "summer": "summer; ete; sommer; verano; verao; estate",
    "upset": "upset",
    "alternate": "alternate; alternative; alt",
    "start of run": "start of run; sor",
    "end of run": "end of run; eor",
    "future": "future",
    "intermittent": "intermittent",
}
_INTERMITTENT = re.compile(
    r"relie(f|ving)|\bpsv\b|start-? ?up|shut-? ?down|blow-? ?down|depress|steam(ing)?-? ?out|regen|dry-? ?out|"
    r"emergency|pigging|flush|purg(e|ing)|upset|commissioning|drain(ing)?\b|evacuation|\bintermittent"
)
_MECHANICAL = re.compile(
    r"(mechanical|mech)( design)?|design|hydro ?test|hydrostatic test|pressure test|test|leak ?test|pneumatic test|"
    r"(full )?vacuum"
)
_NO_FLOW = re.compile(
    r"(normally )?(no|nil) ?(normal )?flow|zero flow|n ?n ?f|(no|nil) flow normally|normally (nil|no)|no flow nnf|"
    r"shut ?in|settle ?out|stagnant|normally closed"
)
_MECHANICAL_WORDS = {
    "design": "design", "mechanical": "mechanical", "mech": "mech", "mechanical design": "mechanical design",
    "test": "test", "hydrotest": "hydrotest", "hydro test": "hydro test", "auslegung": "design", "diseno": "design",
    "projeto": "design", "progetto": "design", "de conception": "design", "conception": "design", "calcul": "design",
    "de calcul": "design", "de diseno": "design", "de projeto": "design", "di progetto": "design",
    "расчетный": "design", "设计": "design", "設計": "design",
}  # fmt: skip
_CASE_WORD = re.compile(r" case$|^case (?=[a-z]{2})")
_MARKS = {"%": "percentsign", "+": "plussign", "-": "minussign"}
_NUMBERED = re.compile(
    r"(design|case|alternate|alt|alternative|relief) ([0-9]{1,3}|[a-oq-su-z])"
)  # P and T are quantities


@lru_cache(maxsize=1)
def _canonical() -> dict[str, str]:
    return {text.strip(): name for name, texts in _SPELLINGS.items() for text in texts.split(";")}


def _words(text: str) -> str:
    """Return the folded words of a case name; a percentage keeps its signs, for it is another case without them."""
    if "%" not in text:
        return fold_words(text)
    marked = re.sub(r"%|[-+](?=\s*\d)", lambda match: f" {_MARKS[match[0]]} ", tidy(text))
    words = fold_words(marked)
    for sign, word in _MARKS.items():
        words = words.replace(word, sign)
    return words


def canonical_case(text: str) -> str:
    """Return the canonical name of a case, or its folded words where it is no usual one."""
    words = _words(text)
    words = _CASE_WORD.sub("", words) or words
    without_flow = words.removesuffix(" flow")
    usual = _case_of_words(without_flow) or (without_flow if _MECHANICAL.fullmatch(without_flow) else "")
    return usual or words


def case_kind(name: str) -> CaseKind:
    """Return what kind of case a canonical name means; a name that says nothing is a continuous case."""
    if not name:
        return CaseKind.UNKNOWN
    words = fold_words(name)
    if _MECHANICAL.fullmatch(words):
        return CaseKind.MECHANICAL_ONLY
    if _NO_FLOW.fullmatch(words):
        return CaseKind.NO_FLOW
    return CaseKind.INTERMITTENT if _INTERMITTENT.search(name) else CaseKind.CONTINUOUS


def _case_of_words(words: str) -> str:
    name = _CASE_WORD.sub("", words)
    return _canonical().get(name, name if _NUMBERED.fullmatch(name) else "")


def _mechanical_of_words(words: str) -> str:
    return _MECHANICAL_WORDS.get(_CASE_WORD.sub("", words), "")


def _splits(words: str, case_of: Callable[[str], str]) -> list[tuple[str, str]]:
    parts = words.split()
    splits = []
    for count in (4, 3, 2, 1):
        for start in range(len(parts) - count + 1):
            case = case_of(" ".join(parts[start : start + count]))
            rest = " ".join(parts[:start] + parts[start + count :])
            if case and rest:
                splits.append((case, rest))
    return splits


def split_case(words: str) -> list[tuple[str, str]]:
    """Return every way to split the folded words of a header into a case and the rest."""
    splits = _splits(words, _case_of_words)
    parts = words.split()
    if "intermittent" in parts and len(splits) > 1:
        others = " ".join(part for part in parts if part != "intermittent")
        splits = [(f"{case} intermittent", rest) for case, rest in _splits(others, _case_of_words)] + splits
    return splits


def split_mechanical_case(words: str) -> list[tuple[str, str]]:
    """Return every way to split folded words into design, test or the like and the rest: a flow may name them too."""
    return _splits(words, _mechanical_of_words)
