"""One outcome as people read it: numbers put into the equation, and the cell each number came from."""

from __future__ import annotations

import math
import re
from collections.abc import Iterator
from functools import cache

from checker.criteria.limits import LIMIT_DIMENSION, limit_origin
from checker.evaluation.assumptions import ASSUMABLE, assumptions_behind, shown_assumption
from checker.evaluation.dependencies import behind
from checker.evaluation.reasons import gap_sentence, is_missing, why_missing
from checker.evaluation.values import Values
from checker.fields import all_fields
from checker.model import Gap
from checker.review_model import CellValue, OutcomeRow
from checker.ruling.contract import FORCES, Outcome, Rule
from checker.ruling.run import Judged
from checker.ruling.tristate import UNKNOWN
from checker.shown import meaning_of, shown_at, shown_number
from checker.units import from_si, read_unit

__all__ = ["calculation_in_words", "calculation_text", "exceeded", "outcome_row", "reason_for"]

_PLACEHOLDER = re.compile(r"\{(\w+)\}")
_LOOKED_UP = ("schedule_used", "outside_diameter", "wall_thickness", "inside_diameter", "material_used", "roughness")


def calculation_text(rule: Rule, values: Values, line_case: int) -> str:
    """Return the rule's equation with the numbers put in."""

    def put(match: re.Match[str]) -> str:
        return shown_at(match[1], values[match[1]], line_case)

    return _PLACEHOLDER.sub(put, rule.calculation)


def calculation_in_words(rule: Rule) -> str:
    """Return the rule's equation with what each number means in its place."""
    return _PLACEHOLDER.sub(lambda match: meaning_of(match[1]), rule.calculation)


def _names_of(rule: Rule) -> tuple[str, ...]:
    return tuple(dict.fromkeys((*rule.applies_parameters, *rule.parameters)))


@cache
def _reached(names: tuple[str, ...], phase: int) -> frozenset[str]:
    return frozenset().union(*(behind(name, phase) for name in names))


def _listed_cells(rule: Rule, values: Values, line_case: int) -> Iterator[CellValue]:
    phase = int(values["phase"][line_case])
    reached = _reached(_names_of(rule), phase)
    for field in all_fields():
        if field.name not in reached and f"{field.name}_listed" not in reached:
            continue
        if values.line_list.gap(field.name)[line_case] != Gap.GIVEN:
            continue
        address = values.line_list.address(field.name, line_case)
        held = values[f"{field.name}_listed"] if field.kind != "text" else values.line_list.text(field.name)
        written = values.line_list.cell(field.name, line_case)
        shown = shown_at(field.name, held, line_case)
        yield CellValue(field.name, field.meaning, shown, written, str(address) if address else "")


def _looked_up(rule: Rule, values: Values, line_case: int) -> Iterator[CellValue]:
    phase = int(values["phase"][line_case])
    reached = _reached(_names_of(rule), phase)
    for name in _LOOKED_UP:
        listed = name.removesuffix("_used")
        given = values.line_list.gap(listed)[line_case] == Gap.GIVEN
        if name not in reached or given or is_missing(values, name, line_case):
            continue
        yield CellValue(name, meaning_of(name), shown_at(name, values[name], line_case), "", _origin(values, name))


def _origin(values: Values, name: str) -> str:
    classes = "no class file" if values.classes is None else f"class file {values.classes.source.name}"
    return {
        "schedule_used": classes,
        "material_used": classes,
        "outside_diameter": "ASME B36.10M / B36.19M by size",
        "wall_thickness": f"ASME B36.10M / B36.19M by size and schedule, or {classes}",
        "inside_diameter": "outside diameter less twice the wall",
        "roughness": f"{classes}, or the adopted roughness of the material",
    }[name]


def _limit_origin(rule: Rule, values: Values, line_case: int) -> str:
    if not rule.limit_key:
        return ""
    return limit_origin(
        values.criteria,
        rule.limit_key,
        int(values["service_code"][line_case]),
        float(values["size"][line_case]),
        float(values["pressure"][line_case]),
    )


def rests_on(rule: Rule, values: Values, line_case: int) -> tuple[str, ...]:
    """Return the assumptions a rule's result rests on at one line case, in words."""
    phase = int(values["phase"][line_case])
    fields = frozenset().union(*(assumptions_behind(name, phase) for name in rule.parameters))
    sentences = []
    for field in ASSUMABLE:
        if field in fields and values[f"{field}_assumed"][line_case]:
            shown, source = shown_assumption(values, field, line_case)
            sentences.append(f"{ASSUMABLE[field]} {shown} assumed: {source}")
    return tuple(sentences)


def _limit_reason(values: Values, key: str, line_case: int) -> str:
    if is_missing(values, "service_code", line_case):
        return why_missing(values, "service_code", line_case)
    if values["service_code_assumed"][line_case]:
        text = values["service_listed"].text(line_case)
        return f"service {text!r} matches none of the criteria, so that its {key} is not known"
    for name in ("size", "pressure"):
        if is_missing(values, name, line_case):
            return f"the limit goes by {name}: {gap_sentence(values, name, line_case)}"
    return f"the criteria set no {key} for this service"


def _first_missing(names: tuple[str, ...], values: Values, line_case: int) -> str:
    for name in names:
        if name in LIMIT_DIMENSION:
            if is_missing(values, name, line_case):
                return _limit_reason(values, name, line_case)
        elif is_missing(values, name, line_case):
            return why_missing(values, _behind_given(name), line_case)
    return ""


def _behind_given(name: str) -> str:
    """Return the field whose gap a 'given' state tells of."""
    return {
        "pressure_drop_allowed_given": "pressure_drop_allowed",
        "vapour_pressure_given": "vapour_pressure",
        "stated_values_given": "stated_difference",
        "continuous": "case_kind",
        "line_has_minimum_case": "velocity_at_minimum",
        "is_minimum_case": "velocity_at_minimum",
        "steam": "service_code",
    }.get(name, name)


def reason_for(rule: Rule, values: Values, line_case: int, *, applies: int, fault: str) -> str:
    """Return why one outcome is `not checked`: the field, the cell, and what is wrong with it."""
    if fault:
        return fault
    if applies == UNKNOWN:
        reason = _first_missing(rule.applies_parameters, values, line_case)
        if reason:
            return reason
    reason = _first_missing((*rule.required, *rule.optional), values, line_case)
    if reason:
        return reason
    resting = rests_on(rule, values, line_case)
    if resting:
        return f"would meet, but rests on what is not conservative here: {'; '.join(resting)}"
    return "the value or its limit is not a finite number"


def _shown(rule: Rule, number: float) -> str:
    if rule.sense == "condition":
        return "not known" if math.isnan(number) else "no" if number > 0.0 else "yes"
    if not rule.dimension or rule.dimension == "dimensionless":
        return shown_number(number)
    unit = read_unit(rule.unit, rule.dimension)
    return shown_number(float(from_si(number, unit)), rule.unit.replace("/100m", "/100 m"))


def outcome_row(
    rule: Rule, judged: Judged, values: Values, line_case: int, *, outcome: Outcome, remark: str = ""
) -> OutcomeRow:
    """Return one outcome in full.

    Parameters
    ----------
    rule, judged, values
        The rule, what it says of every line case, and the fields.
    line_case : int
        Index of the line case.
    outcome : Outcome
        The outcome to show (an approved deviation differs from the rule's own).
    remark : str
        A sentence in place of the computed reason.
    """
    line_list = values.line_list
    line = int(line_list.line[line_case])
    value, limit = float(judged.value[line_case]), float(judged.limit[line_case])
    reason = remark or _reason(rule, judged, values, line_case, outcome)
    return OutcomeRow(
        line_number=line_list.line_number[line],
        case=line_list.case.text(line_case),
        service=line_list.text("service").text(line_case),
        rule=rule.id,
        title=rule.title,
        force=FORCES[int(judged.force[line_case])],
        outcome=outcome.words,
        value=value,
        limit=limit,
        utilisation=float(judged.utilisation[line_case]),
        unit="" if rule.unit in ("", "-") else rule.unit,
        value_shown=_shown(rule, value),
        limit_shown=_limit_shown(rule, limit),
        limit_origin=_limit_origin(rule, values, line_case),
        reason=reason,
        calculation=calculation_text(rule, values, line_case),
        source=str(rule.source),
        cells=(*_listed_cells(rule, values, line_case), *_looked_up(rule, values, line_case)),
        rests_on=rests_on(rule, values, line_case),
        composite=bool(line_list.composite[line_case]),
        line_case=line_case,
    )


def _reason(rule: Rule, judged: Judged, values: Values, line_case: int, outcome: Outcome) -> str:
    if outcome == Outcome.NOT_CHECKED:
        return reason_for(rule, values, line_case, applies=int(judged.applies[line_case]), fault=judged.fault)
    return "" if outcome != Outcome.DOES_NOT_MEET else exceeded(rule, judged, values, line_case)


def _limit_shown(rule: Rule, limit: float) -> str:
    if rule.sense == "condition":
        return "yes"
    return _shown(rule, limit) if math.isnan(limit) else f"{rule.sense} {_shown(rule, limit)}"


def exceeded(rule: Rule, judged: Judged, values: Values, line_case: int) -> str:
    """Return in a sentence by how much a limit is passed."""
    if rule.sense == "condition":
        return calculation_text(rule, values, line_case)
    number, bound = float(judged.value[line_case]), float(judged.limit[line_case])
    words = "short of" if rule.sense == "at least" else "over"
    share = abs(number - bound) / abs(bound) if bound else math.inf
    part = f"{100.0 * share:.3g} % {words} the limit" if math.isfinite(share) else f"{words} the limit"
    return f"{part}: {_shown(rule, number)} where {rule.sense} {_shown(rule, bound)} is asked"
