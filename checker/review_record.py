"""One review of one line list: what was found, and every table of it made when first asked for."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass, field
from functools import cached_property
from typing import TYPE_CHECKING

import numpy as np

from checker import review_frames, review_tables
from checker.cautions import cautions_of
from checker.completeness import Completeness
from checker.deviations import Deviation
from checker.errors import InputError, Problem
from checker.evaluation.values import Values
from checker.ledger_text import ledger_lines
from checker.model import CellRecord, HeaderMatch, HoldItem, RangeItem, Source, UnreadItem
from checker.not_checked import not_checked_groups
from checker.outcome_rows import outcome_row
from checker.recommendation import Recommendation
from checker.review_basis import assumption_items, basis_of, rule_summaries, service_matches
from checker.review_model import (
    AssumptionItem,
    Basis,
    CautionItem,
    NotCheckedGroup,
    OutcomeRow,
    RuleSummary,
    ServiceMatch,
)
from checker.ruling.contract import FORCES, Outcome, Rule
from checker.ruling.run import Judged, Judgement, judge

if TYPE_CHECKING:
    import pandas as pd

__all__ = ["AppliedDeviations", "Review"]


@dataclass(frozen=True)
class AppliedDeviations:
    """What became of the approvals: those that were used, and those that matched nothing or ran out."""

    items: tuple[tuple[Deviation, str], ...] = ()
    source: Source | None = None


@dataclass(frozen=True)
class Review:
    """One review of one line list; every table is made when it is first asked for.

    Attributes
    ----------
    values : Values
        Every field of every line case.
    judgement : Judgement
        Every rule over every line case, approved deviations put in.
    recommended : Recommendation
        The recommendation with its reasons and the coverage.
    applied : AppliedDeviations
        The approvals and what became of each.
    completeness : Completeness or None
        The list held against the lines on the drawings, where they were given.
    """

    values: Values
    judgement: Judgement
    recommended: Recommendation
    applied: AppliedDeviations = field(default_factory=AppliedDeviations)
    completeness: Completeness | None = None

    @property
    def title(self) -> str:
        """Title of the project as its criteria give it."""
        return self.values.criteria.title

    @property
    def document(self) -> str:
        """Document number of the criteria."""
        return self.values.criteria.document

    @property
    def recommendation(self) -> str:
        """`no comments`, `comments`, `revise and resubmit` or `incomplete`."""
        return self.recommended.word

    @property
    def recommendation_text(self) -> str:
        """The recommendation, with the words that stand before it on the bundled criteria."""
        default = self.values.criteria.default_only
        return f"screened on default criteria: {self.recommendation}" if default else self.recommendation

    @property
    def reasons(self) -> tuple[str, ...]:
        """Why this recommendation."""
        return self.recommended.reasons

    @property
    def coverage(self) -> float:
        """Share of the applicable outcomes on the lines' duty that was checked."""
        return self.recommended.coverage

    @property
    def coverage_text(self) -> str:
        """First line of every summary: the outcomes on the lines' duty, the list's own figures apart."""
        outcome = self.judgement.outcome[[not rule.on_data for rule in self.judgement.rules]]
        unchecked = int((outcome == Outcome.NOT_CHECKED).sum())
        checked = int(np.isin(outcome, _CHECKED).sum())
        if not checked + unchecked:
            return "checked 0.0 %, not checked 0.0 %: no rule applied"
        share = round(100.0 * self.coverage, 1)
        share = min(share, 99.9) if unchecked else share
        return f"checked {share:.1f} %, not checked {100.0 - share:.1f} %"

    @cached_property
    def tally(self) -> Mapping[str, int]:
        """Count of every outcome; adds up to line cases x rules."""
        return self.judgement.tally()

    @property
    def lines_count(self) -> int:
        """Rows of the list that are lines."""
        return len(self.values.line_list.line_number)

    @property
    def line_cases(self) -> int:
        """Line cases."""
        return self.values.line_list.line_cases

    @property
    def rules_count(self) -> int:
        """Rules that ran."""
        return len(self.judgement.rules)

    @property
    def faults(self) -> tuple[str, ...]:
        """Rules that failed, in words; any fault means exit status 3."""
        return tuple(self.judgement.faults.values())

    @cached_property
    def _judged(self) -> dict[str, Judged]:
        return {}

    def judged(self, rule: Rule) -> Judged:
        """Return what a rule says of every line case, judged again when first asked for."""
        if rule.id not in self._judged:
            self._judged[rule.id] = judge(rule, self.values)
        return self._judged[rule.id]

    def _rows_with(self, *outcomes: Outcome) -> Iterator[OutcomeRow]:
        for index in range(self.rules_count):
            row = self.judgement.outcome[index]
            for line_case in np.flatnonzero(np.isin(row, outcomes)):
                yield self.outcome_at(index, int(line_case))

    def outcome_at(self, rule_index: int, line_case: int) -> OutcomeRow:
        """Return one outcome in full."""
        rule = self.judgement.rules[rule_index]
        outcome = Outcome(int(self.judgement.outcome[rule_index, line_case]))
        return outcome_row(rule, self.judged(rule), self.values, line_case, outcome=outcome)

    @cached_property
    def exceptions(self) -> tuple[OutcomeRow, ...]:
        """Outcomes that do not meet, ranked by force, then by how far they are over."""
        rows = self._rows_with(Outcome.DOES_NOT_MEET)
        return tuple(sorted(rows, key=lambda row: (-FORCES.index(row.force), -_rank(row.utilisation), row.line_case)))

    @cached_property
    def approved(self) -> tuple[OutcomeRow, ...]:
        """Outcomes under an approved deviation."""
        return tuple(self._rows_with(Outcome.APPROVED_DEVIATION))

    @cached_property
    def not_checked_groups(self) -> tuple[NotCheckedGroup, ...]:
        """Outcomes that could not be judged, grouped by rule and reason, the most frequent first."""
        return not_checked_groups(self.judgement, self.values, self.judged)

    @property
    def hold_items(self) -> tuple[HoldItem, ...]:
        """The HOLD register."""
        return self.values.line_list.holds

    @property
    def unread_items(self) -> tuple[UnreadItem, ...]:
        """Rows and cells that were refused."""
        return self.values.line_list.unread

    @property
    def deleted_items(self) -> tuple[UnreadItem, ...]:
        """Lines that their originator deleted: listed, not checked, in no count of outcomes."""
        return self.values.line_list.deleted

    @property
    def range_items(self) -> tuple[RangeItem, ...]:
        """Cells that state two values, each end judged as a line case of its own."""
        return self.values.line_list.ranges

    @property
    def matching(self) -> tuple[HeaderMatch, ...]:
        """What became of every header of the list."""
        return self.values.line_list.matching

    def record(self, field: str, line_case: int) -> CellRecord | None:
        """Return the cell of a number field in full: text, number, unit and SI value; None where there is none."""
        return self.values.line_list.record(field, line_case)

    @cached_property
    def assumption_items(self) -> tuple[AssumptionItem, ...]:
        """Values that were supplied for a line, with their source."""
        return assumption_items(self.values)

    @cached_property
    def caution_items(self) -> tuple[CautionItem, ...]:
        """Cautions of safety, method and local codes."""
        return cautions_of(self.values)

    @cached_property
    def rule_summaries(self) -> tuple[RuleSummary, ...]:
        """Every rule with the counts of its outcomes."""
        return rule_summaries(self.judgement)

    @cached_property
    def service_matches(self) -> tuple[ServiceMatch, ...]:
        """How each service of the list was matched."""
        return service_matches(self.values)

    @cached_property
    def basis(self) -> Basis:
        """Inputs, versions, methods, adopted criteria."""
        drawings = None if self.completeness is None else self.completeness.source
        return basis_of(self.values, deviations=self.applied.source, drawings=drawings)

    @property
    def revisions(self) -> tuple[str, ...]:
        """Revisions that the rows of the list state."""
        return tuple(sorted(self.values.line_list.text("revision").texts))

    @property
    def understood(self) -> tuple[str, ...]:
        """How the list was read."""
        return self.values.line_list.notes

    @property
    def columns_matched(self) -> tuple[tuple[str, str, str, str], ...]:
        """Header, field, case and unit of every matched column."""
        return tuple((c.header, c.field, c.case, c.unit) for c in self.values.line_list.columns)

    @property
    def columns_unmatched(self) -> tuple[str, ...]:
        """Headers that no field claimed."""
        return self.values.line_list.unmatched

    def outcome_rows(self, line_number: str) -> tuple[OutcomeRow, ...]:
        """Return every outcome of one line in full, `not applicable` ones left out.

        Raises
        ------
        InputError
            If the list has no such line.
        """
        cases = self.cases_of(line_number)
        return tuple(
            self.outcome_at(index, int(case))
            for case in cases
            for index in range(self.rules_count)
            if self.judgement.outcome[index, case] != Outcome.NOT_APPLICABLE
        )

    def cases_of(self, line_number: str) -> np.ndarray:
        """Return the line cases of a line number, case of letters aside."""
        line_list = self.values.line_list
        wanted = line_number.strip().casefold()
        mine = [index for index, number in enumerate(line_list.line_number) if number.casefold() == wanted]
        if not mine:
            raise InputError(_no_such_line(line_number, line_list.line_number, line_list.source.name))
        return np.flatnonzero(np.isin(line_list.line, mine))

    def ledger_text(self, line_number: str) -> list[str]:
        """Return the engineering Bernoulli ledger of a line's cases as text lines."""
        return ledger_lines(self.values, self.cases_of(line_number))

    def results(self) -> review_tables.ResultsTable:
        """Return the results of every line."""
        return review_tables.result_rows(self.values, self.judgement)

    def utilisation_points(self) -> review_tables.UtilisationPoints:
        """Return the utilisation of every judged outcome."""
        return review_tables.utilisation_points(self.judgement)

    def velocity_points(self) -> review_tables.VelocityPoints:
        """Return velocity against its limit."""
        return review_tables.velocity_points(self.values, self.judgement)

    def hydraulics_columns(self) -> list[tuple[str, str, np.ndarray]]:
        """Return name, SI unit and values of every hydraulic column."""
        return list(review_tables.hydraulics_columns(self.values))

    def flow_regimes(self) -> list[str]:
        """Return the flow regime of each line case in words."""
        return review_tables.flow_regimes(self.values)

    def line_case_labels(self) -> list[tuple[str, str]]:
        """Return line number and case of every line case."""
        line_list = self.values.line_list
        return [
            (line_list.line_number[int(line)], line_list.case.text(index)) for index, line in enumerate(line_list.line)
        ]

    @cached_property
    def lines(self) -> pd.DataFrame:
        """The list's fields in SI, what was looked up or assumed filled in."""
        return review_tables.lines_frame(self.values)

    @cached_property
    def hydraulics(self) -> pd.DataFrame:
        """The hydraulics of every line case."""
        return review_tables.hydraulics_frame(self.values)

    @cached_property
    def outcomes(self) -> pd.DataFrame:
        """Every line case and rule but the `not applicable` ones."""
        return review_frames.outcomes_frame(self)

    @cached_property
    def holds(self) -> pd.DataFrame:
        """The HOLD register."""
        return review_frames.holds_frame(self.hold_items)

    @cached_property
    def assumptions(self) -> pd.DataFrame:
        """Values supplied for a line."""
        return review_frames.items_frame(self.assumption_items, AssumptionItem)

    @cached_property
    def cautions(self) -> pd.DataFrame:
        """Cautions."""
        return review_frames.items_frame(self.caution_items, CautionItem)

    @cached_property
    def deviations(self) -> pd.DataFrame:
        """Approvals and what became of each."""
        return review_frames.deviations_frame(self.applied.items)

    @cached_property
    def unread(self) -> pd.DataFrame:
        """Rows and cells that were refused."""
        return review_frames.unread_frame(self.unread_items)


_CHECKED = (Outcome.MEETS, Outcome.DOES_NOT_MEET, Outcome.APPROVED_DEVIATION)


def _rank(utilisation: float) -> float:
    return float("inf") if np.isnan(utilisation) else utilisation


def _no_such_line(line_number: str, known: tuple[str, ...], file: str) -> Problem:
    import difflib

    close = difflib.get_close_matches(line_number, known[:50_000], n=3)
    remedy = f"Did you mean {' or '.join(close)}?" if close else "Give the number as the list writes it."
    return Problem(f"has no line {line_number!r}.", file, remedy)
