"""The one function that runs it all."""

from __future__ import annotations

import difflib
import math
import os
from datetime import date
from pathlib import Path

import numpy as np

from checker.cautions import twin_rows
from checker.completeness import Completeness, compare, read_drawing_lines
from checker.completeness.record import RENUMBERED
from checker.criteria.classes import load_classes
from checker.criteria.criteria import Criteria
from checker.criteria.load import load_criteria
from checker.deviations import Deviation, DeviationFile, load_deviations, where_approved
from checker.errors import InputError, Problem, ToolFaultError
from checker.evaluation.values import Values, known_fields
from checker.intake import read_line_list
from checker.recommendation import recommend
from checker.review_basis import ASSUMED_FIELDS, UNMATCHED_WORDS, service_matches
from checker.review_record import AppliedDeviations, Review
from checker.ruling.catalogue import load_rules
from checker.ruling.contract import Outcome, Rule
from checker.ruling.run import Judgement, judge, judge_all
from checker.ruling.tristate import NO

__all__ = ["Review", "evaluate", "require_no_fault", "review"]

PathLike = str | os.PathLike[str]


def review(
    line_list: PathLike,
    *,
    criteria: PathLike | None = None,
    classes: PathLike | None = None,
    equipment: PathLike | None = None,
    deviations: PathLike | None = None,
    rules: PathLike | None = None,
    sheet: str | None = None,
    drawing_lines: PathLike | None = None,
    today: date | None = None,
) -> Review:
    """Read a line list, compute its hydraulics and judge every line case by every rule.

    Parameters
    ----------
    line_list : path
        The contractor's line list: a delimited text or a workbook.
    criteria : path, optional
        Criteria file (TOML); the bundled default criteria where none is given.
    classes : path, optional
        Class file (CSV): schedule, wall, material and roughness by piping class and size.
    equipment : path, optional
        Not used by this version yet: naming one is an error, so that nobody thinks it was used.
    deviations : path, optional
        Approved deviations (CSV).
    rules : path, optional
        A folder of further rule modules.
    sheet : str, optional
        Sheet of a workbook; the one that looks like a line list where none is named.
    drawing_lines : path, optional
        The lines on the drawings, one line number a row, with its drawing: what the list is held against for
        completeness.
    today : date, optional
        Day on which deviations are held against their last day; the current day where none is given.

    Returns
    -------
    Review

    Raises
    ------
    InputError
        If an input cannot be used; the message names what, where and what to do.
    ToolFaultError
        If a bundle of rules does not load.
    """
    if equipment is not None:
        remedy = "Leave it out: suction data stand in the list's own columns."
        raise InputError(Problem("an equipment list is not used by this version yet.", os.fspath(equipment), remedy))
    found = load_rules(known_fields=known_fields(), folder=None if rules is None else Path(rules))
    used_criteria = load_criteria(None if criteria is None else Path(criteria))
    _check_forces(used_criteria, found)
    used_classes = None if classes is None else load_classes(Path(classes), units=used_criteria.units)
    approvals = (
        None
        if deviations is None
        else load_deviations(Path(deviations), rules=found, atmosphere=used_criteria.atmosphere)
    )
    drawn = None if drawing_lines is None else read_drawing_lines(Path(drawing_lines))
    listed = read_line_list(
        Path(line_list),
        units=used_criteria.units,
        columns=used_criteria.columns,
        atmosphere=used_criteria.atmosphere,
        ambient=_ambient(used_criteria),
        sheet=sheet,
    )
    values = Values(line_list=listed, criteria=used_criteria, classes=used_classes)
    complete = None if drawn is None else compare(listed, drawn)
    return evaluate(values, found, approvals=approvals, today=today or date.today(), completeness=complete)


def _ambient(criteria: Criteria) -> tuple[float, float] | None:
    """Return the site's lowest and highest ambient temperature, K; None unless the criteria state both."""
    limits = (criteria.ambient_minimum, criteria.ambient_maximum)
    return None if any(map(math.isnan, limits)) else limits


def evaluate(
    values: Values,
    rules: tuple[Rule, ...],
    *,
    approvals: DeviationFile | None,
    today: date,
    completeness: Completeness | None = None,
) -> Review:
    """Judge the values by the rules, put approved deviations in, and recommend."""
    judgement = judge_all(rules, values)
    applied = AppliedDeviations()
    if approvals is not None:
        judgement, applied = _with_deviations(judgement, values, approvals, today)
    stale = sum(word != "applied" for _, word in applied.items)
    line_list = values.line_list
    unmatched = sum(match.matched.endswith(UNMATCHED_WORDS) for match in service_matches(values))
    without_flow, any_flow = _lines_without_flow(values)
    assumed = sum(bool(values[f"{name}_assumed"].any()) for name in ASSUMED_FIELDS)
    recommended = recommend(
        judgement,
        gross_factor=values.criteria.gross_factor,
        coverage_minimum=values.criteria.coverage_minimum,
        open_items={
            "HOLDs": len(line_list.holds),
            "rows, columns and cells not read": len(line_list.unread),
            "services not matched": unmatched,
            "lines without flow in any case": without_flow,
            "line numbers on several rows for one case": len(twin_rows(values)),
            "kinds of assumption": assumed,
            "approvals not used": stale,
            **_incomplete(completeness),
        },
        any_flow=any_flow,
    )
    return Review(values, judgement, recommended, applied, completeness)


def _incomplete(completeness: Completeness | None) -> dict[str, int]:
    """Return what list and drawings do not agree on, by kind and how often; renumbered lines count as missing."""
    if completeness is None:
        return {}
    counts = {f"lines '{kind}'": count for kind, count in completeness.counts.items() if kind != RENUMBERED}
    return {**counts, "rows of the drawings' file not read": len(completeness.unread)}


def _lines_without_flow(values: Values) -> tuple[int, bool]:
    """Return how many lines flow in none of their cases, and whether any line of the list flows at all."""
    group = values["line_group"]
    flows = np.zeros(int(group.max(initial=-1)) + 1, dtype=np.bool_)
    flows[group[values["flowing"] != NO]] = True
    return int((~flows).sum()), bool(flows.any())


def _check_forces(criteria: Criteria, rules: tuple[Rule, ...]) -> None:
    """Refuse a force that the criteria set for a rule nobody knows.

    Raises
    ------
    InputError
        Every such key at once, with its service and the closest rule.
    """
    known = [rule.id for rule in rules]
    problems = [
        Problem(
            f"force names the rule {name!r}, which is not known.",
            f"{criteria.source.name}, service {service.name!r}",
            f"Did you mean {' or '.join(difflib.get_close_matches(name, known, n=2)) or 'one of `linelist rules`'}?",
        )
        for service in criteria.services
        for name in service.force
        if name not in known
    ]
    if problems:
        raise InputError(problems)


def _with_deviations(
    judgement: Judgement, values: Values, approvals: DeviationFile, today: date
) -> tuple[Judgement, AppliedDeviations]:
    outcome = judgement.outcome.copy()
    places = {rule.id: index for index, rule in enumerate(judgement.rules)}
    items: list[tuple[Deviation, str]] = []
    for deviation in approvals.deviations:
        rule = judgement.rules[places[deviation.rule]]
        judged = judge(rule, values)
        spoken_of, approved = where_approved(deviation, rule=rule, judged=judged, values=values, today=today)
        outcome[places[deviation.rule]][approved] = Outcome.APPROVED_DEVIATION
        items.append((deviation, _fate(deviation, bool(spoken_of.any()), bool(approved.any()), today)))
    return judgement.with_outcome(outcome), AppliedDeviations(tuple(items), approvals.source)


def _fate(deviation: Deviation, spoken_of: bool, approved: bool, today: date) -> str:
    if approved:
        return "applied"
    if not spoken_of:
        return "stale: no outcome of that line, case and rule does not meet"
    return "run out" if today > deviation.until else "exceeded: the value is beyond the approved one"


def require_no_fault(done: Review) -> None:
    """Raise where a rule failed, so that no command ends as if it had run.

    Raises
    ------
    ToolFaultError
        If any rule failed.
    """
    if done.faults:
        remedy = "Its cases are `not checked`. Mend the rule, or take it out."
        raise ToolFaultError([Problem(fault, "", remedy) for fault in done.faults])
