"""What does not meet, once a line and rule: the worst case in full, the other cases beneath it."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from functools import cache

from checker.fields import all_fields
from checker.model import base_case
from checker.report.wording import plural
from checker.review_model import CellValue, OutcomeRow

__all__ = ["Breach", "breaches_of", "counted_both_ways"]


@dataclass(frozen=True, slots=True)
class Breach:
    """One rule that is not met on one line.

    Attributes
    ----------
    rank : int
        Place among all of them; 1 is the worst.
    worst : OutcomeRow
        The case that is furthest from the limit.
    others : tuple of OutcomeRow
        The other cases that do not meet the same rule, in the order of the review.
    """

    rank: int
    worst: OutcomeRow
    others: tuple[OutcomeRow, ...]

    @property
    def rows(self) -> tuple[OutcomeRow, ...]:
        """Every case, the worst first."""
        return (self.worst, *self.others)

    @property
    def cases(self) -> str:
        """The names of the cases, the worst first; empty where the list names none.

        Line cases that differ only by the ends of ranges are counted, not named one by one.
        """
        named: dict[str, dict[str, None]] = {}
        for row in self.rows:
            if row.case:
                named.setdefault(base_case(row.case), {})[row.case] = None
        return ", ".join(
            next(iter(cases)) if len(cases) == 1 else f"{base} in {len(cases)} combinations of its ranges"
            for base, cases in named.items()
        )

    def own_cells(self, row: OutcomeRow) -> tuple[CellValue, ...]:
        """Return the numbers of another case that the worst case does not rest on."""
        return tuple(cell for cell in row.cells if cell not in self.worst.cells)

    @property
    def alike(self) -> bool:
        """True where every case says the very same, as for a condition on the pipe."""
        said = {(row.value_shown, row.limit_shown, row.force, row.reason, row.calculation) for row in self.rows}
        return len(said) == 1

    @property
    def composite(self) -> bool:
        """True where the worst case is put together from several and the rule reads a field that goes by case."""
        return self.worst.composite and any(cell.field in _fields_by_case() for cell in self.worst.cells)


def breaches_of(exceptions: Iterable[OutcomeRow]) -> tuple[Breach, ...]:
    """Return ranked exceptions put together by line and rule, the order of the worst of each kept."""
    together: dict[tuple[str, str], list[OutcomeRow]] = {}
    for row in exceptions:
        together.setdefault((row.line_number, row.rule), []).append(row)
    return tuple(Breach(rank, rows[0], tuple(rows[1:])) for rank, rows in enumerate(together.values(), start=1))


def counted_both_ways(outcomes: int, breaches: int) -> str:
    """Return how many outcomes do not meet, and how many rules on a line that is."""
    said = f"{plural(outcomes, 'outcome')} {'does' if outcomes == 1 else 'do'} not meet"
    return f"{said}: {plural(breaches, 'time')} a rule on a line"


@cache
def _fields_by_case() -> frozenset[str]:
    return frozenset(field.name for field in all_fields() if field.per_case)
