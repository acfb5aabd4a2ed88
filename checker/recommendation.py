"""From outcomes to one recommendation on the whole list."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from checker.ruling.contract import FORCES, Outcome
from checker.ruling.run import Judgement

__all__ = ["Recommendation", "coverage_of", "recommend"]

SHALL = FORCES.index("shall")
SHOULD = FORCES.index("should")


@dataclass(frozen=True, slots=True)
class Recommendation:
    """The recommendation, the sentences that lead to it, and the share of applicable outcomes that was checked."""

    word: str
    reasons: tuple[str, ...]
    coverage: float


def coverage_of(judgement: Judgement) -> float:
    """Return checked over applicable outcomes; zero where nothing applies, for then nothing was checked."""
    counts = np.bincount(judgement.outcome.ravel(), minlength=len(Outcome))
    checked = counts[Outcome.MEETS] + counts[Outcome.DOES_NOT_MEET] + counts[Outcome.APPROVED_DEVIATION]
    applicable = checked + counts[Outcome.NOT_CHECKED]
    return float(checked / applicable) if applicable else 0.0


def _plural(count: int, word: str) -> str:
    return f"{count:,} {word}{'' if count == 1 else 's'}".replace(",", " ")


def recommend(judgement: Judgement, *, gross_factor: float, coverage_minimum: float, open_items: int) -> Recommendation:
    """Return the recommendation of a list.

    `revise and resubmit` if any `shall` is not met, or a `should` by more than the gross factor; `incomplete` if less
    than the coverage of applicable outcomes could be checked; `comments` if anything is left to say; else
    `no comments`.

    Parameters
    ----------
    judgement : Judgement
    gross_factor : float
        Utilisation above which an unmet `should` asks for a revision.
    coverage_minimum : float
        Least share of applicable outcomes that must have been checked.
    open_items : int
        HOLDs, refused cells, assumptions, unmatched services, stale deviations: anything else left to say.
    """
    unmet = judgement.outcome == Outcome.DOES_NOT_MEET
    shall = int((unmet & (judgement.force == SHALL)).sum())
    gross = int((unmet & (judgement.force == SHOULD) & (judgement.utilisation > gross_factor)).sum())
    other = int(unmet.sum()) - shall - gross
    unchecked = int((judgement.outcome == Outcome.NOT_CHECKED).sum())
    coverage = coverage_of(judgement)
    revise = [
        f"{_plural(shall, 'outcome')} of force shall not met" if shall else "",
        f"{_plural(gross, 'outcome')} of force should exceeded by more than the factor {gross_factor:g}"
        if gross
        else "",
    ]
    share = f"{100.0 * coverage:.1f} % of the applicable outcomes could be checked"
    incomplete = f"only {share}, less than {100.0 * coverage_minimum:g} %" if coverage < coverage_minimum else ""
    remarks = [
        f"{_plural(other, 'other outcome')} not met" if other else "",
        f"{_plural(unchecked, 'outcome')} not checked" if unchecked else "",
        f"{_plural(open_items, 'open item')} (HOLDs, refused cells, assumptions, services not matched)"
        if open_items
        else "",
    ]
    reasons = tuple(text for text in (*revise, incomplete, *remarks) if text)
    if any(revise):
        return Recommendation("revise and resubmit", reasons, coverage)
    if incomplete:
        return Recommendation("incomplete", reasons, coverage)
    return Recommendation("comments" if reasons else "no comments", reasons or (f"all {share}",), coverage)
