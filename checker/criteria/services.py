"""Which service of the criteria a line is, by its text and its phase."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np
from numpy.typing import NDArray

from checker.criteria.criteria import Criteria, Service
from checker.criteria.text_folding import fits, fold_pattern, fold_text
from checker.model import Coded, Phase

__all__ = ["general_row", "matched", "service_codes", "services_of_texts", "unmatched_codes"]

_PHASES = {"liquid": Phase.LIQUID, "gas": Phase.GAS, "two-phase": Phase.TWO_PHASE}
_COLUMNS = (Phase.LIQUID, Phase.GAS, Phase.TWO_PHASE, Phase.UNKNOWN)
IntArray = NDArray[np.int32]
BoolArray = NDArray[np.bool_]


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


def _fitting_services(criteria: Criteria, texts: Sequence[str]) -> IntArray:
    """Return the service whose own matches hold each text in each phase, laid out as `services_of_texts`."""
    matcher = _Matcher(criteria.services)
    table = np.full((len(texts) + 1, len(_COLUMNS)), -1, dtype=np.int32)
    for row, text in enumerate(texts):
        candidates = matcher.candidates(text)
        table[row] = [_of_phase(criteria, candidates, phase) for phase in _COLUMNS]
    return table


def _general_rows(criteria: Criteria, texts: Sequence[str]) -> IntArray:
    """Return the general row that each text may fall back to in each phase, laid out as `services_of_texts`."""
    given = np.array([*(bool(fold_text(text)) for text in texts), False])
    general = np.array([general_row(criteria, phase) for phase in _COLUMNS], dtype=np.int32)
    return np.where(given[:, np.newaxis], general, np.int32(-1))


def _phase_column(phase: NDArray[np.int8]) -> NDArray[np.int8]:
    """Return the column of each phase in the tables of this module."""
    return np.where((phase >= 0) & (phase <= Phase.TWO_PHASE), phase, np.int8(-1))


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
    fitting = _fitting_services(criteria, texts)
    return np.where(fitting >= 0, fitting, _general_rows(criteria, texts))


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
    return table[service.codes, _phase_column(phase)]


def unmatched_codes(*, criteria: Criteria, service: Coded, phase: NDArray[np.int8]) -> BoolArray:
    """Return which line cases took a general row only because their service text fits no service of their phase.

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
    bool array, shape (n,)
        True where `service_codes` gives a general row and no match of any service, for that phase, holds the text.
        False where the general row's own matches hold it, and where the service is not known (code -1).
    """
    fitting = _fitting_services(criteria, service.texts)
    table = (fitting < 0) & (_general_rows(criteria, service.texts) >= 0)
    return table[service.codes, _phase_column(phase)]
