"""From outcomes to one recommendation on the whole list."""

from __future__ import annotations

from collections.abc import Mapping
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
    """Return checked over applicable outcomes; zero where nothing applies, for then nothing was checked.

    Rules that hold the list against itself are left aside: that figures agree says nothing of a pipe's duty.
    """
    on_duty = [index for index, rule in enumerate(judgement.rules) if not rule.on_data]
    counts = np.bincount(judgement.outcome[on_duty].ravel(), minlength=len(Outcome))
    checked = counts[Outcome.MEETS] + counts[Outcome.DOES_NOT_MEET] + counts[Outcome.APPROVED_DEVIATION]
    applicable = checked + counts[Outcome.NOT_CHECKED]
    return float(checked / applicable) if applicable else 0.0


def _plural(count: int, word: str) -> str:
    return f"{count:,} {word}{'' if count == 1 else 's'}".replace(",", " ")


def _open_sentence(open_items: Mapping[str, int]) -> str:
    there = {kind: count for kind, count in open_items.items() if count}
    kinds = ", ".join(f"{kind} {count}" for kind, count in there.items())
    return f"{_plural(sum(there.values()), 'open item')}: {kinds}" if there else ""


def recommend(
    judgement: Judgement,
    *,
    gross_factor: float,
    coverage_minimum: float,
    open_items: Mapping[str, int],
    any_flow: bool = True,
) -> Recommendation:
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
    open_items : mapping of str to int
        Anything else left to say, by kind (HOLDs, refused cells, services not matched ...) and how often.
    any_flow : bool
        Whether any line case of the list has a flow; without one nothing of its duty was judged.
    """
    unmet = judgement.outcome == Outcome.DOES_NOT_MEET
    shall = int((unmet & (judgement.force == SHALL)).sum())
    gross = int((unmet & (judgement.force == SHOULD) & (judgement.utilisation > gross_factor)).sum())
    other = int(unmet.sum()) - shall - gross
    unchecked = int((judgement.outcome == Outcome.NOT_CHECKED).sum())
    coverage = coverage_of(judgement)
    revise = [
        f"{_plural(shall, 'outcome')} not met where the requirement is a shall" if shall else "",
        f"{_plural(gross, 'outcome')} not met by more than the factor {gross_factor:g}" if gross else "",
    ]
    share = f"{100.0 * coverage:.1f} % of the applicable outcomes on the lines' duty could be checked"
    incomplete = f"only {share}, less than {100.0 * coverage_minimum:g} %" if coverage < coverage_minimum else ""
    if not any_flow:
        incomplete = "no line of the list has a flow in any case, so that nothing of its duty was judged"
    remarks = [
        f"{_plural(other, 'other outcome')} not met" if other else "",
        f"{_plural(unchecked, 'outcome')} not checked" if unchecked else "",
        _open_sentence(open_items),
    ]
    reasons = tuple(text for text in (*revise, incomplete, *remarks) if text)
    if any(revise):
        return Recommendation("revise and resubmit", reasons, coverage)
    if incomplete:
        return Recommendation("incomplete", reasons, coverage)
    return Recommendation("comments" if reasons else "no comments", reasons or (f"all {share}",), coverage)
