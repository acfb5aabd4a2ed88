"""Which service of the criteria a line is, by its text and its phase."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np
from numpy.typing import NDArray

from checker.criteria.criteria import Criteria, Service
from checker.criteria.text_folding import fits, fold_pattern, fold_text
from checker.model import Coded, Phase

__all__ = ["general_row", "matched", "service_codes", "services_of_texts"]

_PHASES = {"liquid": Phase.LIQUID, "gas": Phase.GAS, "two-phase": Phase.TWO_PHASE}
_COLUMNS = (Phase.LIQUID, Phase.GAS, Phase.TWO_PHASE, Phase.UNKNOWN)
IntArray = NDArray[np.int32]


class _Matcher:
    """The matches of the criteria, folded once: exact texts first, then patterns, each in file order."""

    def __init__(self, services: Sequence[Service]) -> None:
        self.exact: dict[str, list[int]] = {}
        self.patterns: list[tuple[str, int]] = []
        for index, service in enumerate(services):
            for pattern in map(fold_pattern, service.matches):
                if "*" in pattern:
                    self.patterns.append((pattern, index))
                else:
                    self.exact.setdefault(pattern, []).append(index)

    def candidates(self, text: str) -> list[int]:
        """Return every service whose matches hold the text, the first to be tried first."""
        folded = fold_text(text)
        if not folded:
            return []
        return self.exact.get(folded, []) + [index for pattern, index in self.patterns if fits(folded, pattern)]


def general_row(criteria: Criteria, phase: Phase) -> int:
    """Return the index of the general row of a phase; -1 where the criteria have none."""
    return next(
        (
            index
            for index, service in enumerate(criteria.services)
            if service.general and _PHASES.get(service.phase) == phase
        ),
        -1,
    )


def _of_phase(criteria: Criteria, candidates: Sequence[int], phase: Phase) -> int:
    """Return the first candidate that holds for a phase; -1 where none does.

    Where the phase is not known, a first candidate that holds for one phase only leaves the service unknown.
    """
    for index in candidates:
        wanted = criteria.services[index].phase
        if not wanted or _PHASES[wanted] == phase:
            return index
        if phase == Phase.UNKNOWN:
            return -1
    return -1


def services_of_texts(criteria: Criteria, texts: Sequence[str]) -> IntArray:
    """Return the service of every distinct text in every phase.

    Parameters
    ----------
    texts : sequence of str
        Distinct service texts of a line list.

    Returns
    -------
    int32 array, shape (texts + 1, 4)
        Index into ``criteria.services``; columns liquid, gas, two-phase, phase not known. The last row, which code -1
        reads, is -1 throughout.
    """
    matcher = _Matcher(criteria.services)
    general = {phase: general_row(criteria, phase) for phase in _COLUMNS}
    table = np.full((len(texts) + 1, len(_COLUMNS)), -1, dtype=np.int32)
    for row, text in enumerate(texts):
        if not fold_text(text):
            continue
        candidates = matcher.candidates(text)
        for column, phase in enumerate(_COLUMNS):
            found = _of_phase(criteria, candidates, phase)
            table[row, column] = found if found >= 0 else general[phase]
    return table


def matched(criteria: Criteria, texts: Sequence[str]) -> list[int]:
    """Return, for each distinct text, the first service whose matches hold it, whatever the phase; -1 where none."""
    matcher = _Matcher(criteria.services)
    return [next(iter(matcher.candidates(text)), -1) for text in texts]


def service_codes(*, criteria: Criteria, service: Coded, phase: NDArray[np.int8]) -> IntArray:
    """Return the service of every line case.

    Exact texts are tried before patterns with ``*``, each in file order; case, blanks and punctuation do not matter.
    A service of the criteria that names a phase holds for that phase only.

    Parameters
    ----------
    criteria : Criteria
        The design criteria.
    service : Coded, shape (n,)
        Service cell of each line case.
    phase : int8 array, shape (n,)
        `checker.model.Phase` of each line case.

    Returns
    -------
    int32 array, shape (n,)
        Index into ``criteria.services``. A text that matches nothing takes the general row of its phase. -1 where the
        text is missing, where the phase is needed and missing, or where the criteria have no such general row.
    """
    table = services_of_texts(criteria, service.texts)
    return table[service.codes, np.where((phase >= 0) & (phase <= Phase.TWO_PHASE), phase, -1)]
