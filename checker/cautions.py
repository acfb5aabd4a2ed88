"""Cautions: what every report says, and what this list gives cause to say."""

from __future__ import annotations

import numpy as np

from checker.evaluation.values import Values
from checker.model import Phase
from checker.review_model import CautionItem

__all__ = ["USUAL_CAUTION", "cautions_of", "twin_rows"]

USUAL_CAUTION = (
    "A screening check of a line list. It does not replace the codes in force, hazard studies, detailed calculation or "
    "the judgement of a licensed engineer. Local codes prevail."
)
LARGEST_TESTED_BORE = 0.0384
COMMON_PRACTICE = "common practice"


def _counted(where: np.ndarray, values: Values) -> str:
    lines = np.unique(values.line_list.line[where])
    first = ", ".join(values.line_list.line_number[int(line)] for line in lines[:5])
    more = f" and {lines.size - 5} more" if lines.size > 5 else ""
    return f"{lines.size} line{'' if lines.size == 1 else 's'}: {first}{more}"


def twin_rows(values: Values) -> tuple[tuple[str, str, tuple[int, ...]], ...]:
    """Return line number, case and rows wherever one line number states one case twice with nothing to tell it apart.

    Rows that differ in case, from, to or size are cases and segments, and are left out.
    """
    line_list = values.line_list
    doubled = np.flatnonzero(values["doubled_line_number"])
    case = line_list.case.codes.astype(np.int64)[doubled]
    key = values["line_group"].astype(np.int64)[doubled] * (len(line_list.case.texts) + 1) + case + 1
    order = np.argsort(key, kind="stable")
    _, first, counts = np.unique(key[order], return_index=True, return_counts=True)
    twins = []
    for start, count in zip(first[counts > 1], counts[counts > 1], strict=True):
        cases = doubled[order[start : start + count]]
        number = line_list.line_number[int(line_list.line[cases[0]])]
        rows = tuple(int(line_list.row[line_list.line[each]]) for each in cases)
        twins.append((number, line_list.case.text(int(cases[0])), rows))
    return tuple(twins)


def _twins(values: Values) -> list[CautionItem]:
    found: dict[str, tuple[int, ...]] = {}
    for number, _, rows in twin_rows(values):
        found.setdefault(number, rows)
    text = (
        "One line number on several rows for the same case, and neither from, to nor size tells the rows apart: each "
        "row is judged by itself. Take it up with the originator: a doubled number, or segments that do not say so."
    )
    shown = [f"{number} (rows {', '.join(map(str, rows[:6]))})" for number, rows in list(found.items())[:5]]
    more = f" and {len(found) - 5} more" if len(found) > 5 else ""
    count = f"{len(found)} line number{'' if len(found) == 1 else 's'}"
    return [CautionItem(f"{count}: {', '.join(shown)}{more}", text, COMMON_PRACTICE)] if found else []


def _jurisdiction(name: str) -> CautionItem:
    text = (
        f"{name}: which local codes bind these lines, and in what category, is for the authority and licensed practice "
        "to say. Nothing here rules on it: confirm before use."
    )
    return CautionItem(name, text, "project criteria, jurisdictions")


def cautions_of(values: Values) -> tuple[CautionItem, ...]:
    """Return the usual caution, one for each jurisdiction of the criteria, and those of method and data."""
    items = [CautionItem("whole list", USUAL_CAUTION, COMMON_PRACTICE)]
    items += [_jurisdiction(name) for name in values.criteria.jurisdictions]
    two_phase = values["phase"] == Phase.TWO_PHASE
    large = two_phase & (values["inside_diameter"] > LARGEST_TESTED_BORE)
    notes = (
        (
            large & (values.criteria.two_phase_method == "beggs-brill"),
            "Beggs and Brill rests on tests in 25 mm and 38 mm pipe: take its pressure drop in larger bores with care.",
            "Beggs and Brill, Journal of Petroleum Technology, May 1973",
        ),
        (
            values["transitional"],
            "Reynolds number from 2 000 to 4 000: the friction factor is the larger of the laminar and turbulent ones.",
            "Crane TP-410, critical zone",
        ),
        (
            values["choked"],
            "Sonic at the outlet plane: its pressure floats above the receiver's, or the flow cannot pass at all.",
            "isothermal flow of a gas",
        ),
        (
            values.line_list.composite | ~values["own_flow"],
            "Composite cases: the case's own flow stands beside pressure, temperature or properties that name no case.",
            COMMON_PRACTICE,
        ),
    )
    items += [CautionItem(_counted(where, values), text, source) for where, text, source in notes if where.any()]
    return (*items, *_twins(values))
