"""Give every line case its outcome under every rule: the one place where a value meets its limit."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray

from checker.criteria.limits import LIMIT_DIMENSION, force_codes
from checker.evaluation.assumptions import assumed_for
from checker.evaluation.values import Values
from checker.model import Coded
from checker.ruling.contract import FORCES, Outcome, Rule, parameter_names
from checker.ruling.tristate import NO, UNKNOWN, YES, all_of

__all__ = ["EQUAL_WITHIN", "Judged", "Judgement", "applies_to", "judge", "judge_all", "missing_in"]

EQUAL_WITHIN = 1e-9
FloatArray = NDArray[np.float64]
BoolArray = NDArray[np.bool_]
CodeArray = NDArray[np.int8]
#: By the state of a limit: set, not set by the criteria, not known.
_LIMIT_APPLIES = np.array([YES, NO, UNKNOWN], dtype=np.int8)
SHALL = FORCES.index("shall")
SHOULD = FORCES.index("should")


@dataclass(frozen=True)
class Judged:
    """What one rule says of every line case.

    Attributes
    ----------
    outcome : int8 array
        `Outcome` codes.
    force : int8 array
        0 note, 1 should, 2 shall.
    value, limit, utilisation : float array
        SI; NaN where there is none; utilisation is infinite where a value that must be at least something is not
        above zero.
    assumed : bool array
        True where the result rests on an assumption the rule does not declare conservative.
    applies : int8 array
        1 where the rule applies, 0 where it does not, -1 where that is not known.
    fault : str
        Why the rule failed; empty where it did not.
    """

    outcome: CodeArray
    force: CodeArray
    value: FloatArray
    limit: FloatArray
    utilisation: FloatArray
    assumed: BoolArray
    applies: CodeArray
    fault: str = ""


@dataclass(frozen=True)
class Judgement:
    """Every rule over every line case: matrices of shape (rules, line cases)."""

    rules: tuple[Rule, ...]
    outcome: CodeArray
    force: CodeArray
    utilisation: FloatArray
    faults: Mapping[str, str]

    def tally(self) -> dict[str, int]:
        """Count every outcome; the counts add up to rules x line cases."""
        counts = np.bincount(self.outcome.ravel(), minlength=len(Outcome))
        return {outcome.words: int(counts[outcome]) for outcome in Outcome}

    def with_outcome(self, outcome: CodeArray) -> Judgement:
        """Return the same judgement with other outcomes (approved deviations)."""
        return Judgement(self.rules, outcome, self.force, self.utilisation, self.faults)


def missing_in(held: Any) -> BoolArray:
    """Return where a field has no value: NaN or infinite, a negative code, no text."""
    if isinstance(held, Coded):
        return np.less(held.codes, 0)
    array = np.asarray(held)
    missing: BoolArray = np.zeros(array.shape, dtype=np.bool_)
    if array.dtype.kind == "f":
        missing = ~np.isfinite(array)
    elif array.dtype.kind == "i":
        missing = array < 0
    return missing


def applies_to(rule: Rule, values: Values) -> CodeArray:
    """Return 1 where a rule applies, 0 where it does not (the criteria may set no such limit), -1 where not known."""
    count = values.line_list.line_cases
    states = [np.full(count, YES, dtype=np.int8)]
    if rule.applies is not None:
        arguments = {name: values[name] for name in rule.applies_parameters}
        answer = np.asarray(rule.applies(**arguments))
        if answer.dtype.kind == "b":
            unknown = np.stack([missing_in(held) for held in arguments.values()]).any(axis=0)
            answer = np.where(unknown, UNKNOWN, answer)
        states.append(np.broadcast_to(answer, (count,)).astype(np.int8))
    for name in rule.required:
        if name in LIMIT_DIMENSION:
            states.append(_LIMIT_APPLIES[values[f"{name}_state"]])
    return all_of(*states)


def _value_and_limit(rule: Rule, values: Values) -> tuple[FloatArray, FloatArray]:
    """Return the rule's value and limit over the line cases, NaN where a required field is missing."""
    count = values.line_list.line_cases
    arguments = {name: values[name] for name in rule.parameters}
    with np.errstate(all="ignore"):
        answer = rule.function(**arguments)
    pair = (np.asarray(answer, dtype=np.float64), 0.0) if rule.sense == "condition" else answer
    value, limit = (np.array(np.broadcast_to(np.asarray(part, dtype=np.float64), (count,))) for part in pair)
    for name in rule.required:
        lost = missing_in(arguments[name])
        value[lost] = np.nan
    return value, limit


def _met(rule: Rule, value: FloatArray, limit: FloatArray) -> BoolArray:
    slack = EQUAL_WITHIN * np.abs(limit)
    with np.errstate(invalid="ignore"):
        return (
            np.greater_equal(value, limit - slack) if rule.sense == "at least" else np.less_equal(value, limit + slack)
        )


def _utilisation(rule: Rule, value: FloatArray, limit: FloatArray) -> FloatArray:
    with np.errstate(all="ignore"):
        if rule.sense == "condition":
            return np.full(value.shape, np.nan)
        if rule.sense == "at least":
            used = np.where(value > 0.0, limit / value, np.inf)
        else:
            used = np.where(limit > 0.0, value / limit, np.where(value > limit, np.inf, np.nan))
    return np.where(np.isfinite(value) & np.isfinite(limit), used, np.nan)


def _force(rule: Rule, values: Values, value: FloatArray) -> CodeArray:
    force = force_codes(
        criteria=values.criteria,
        rule_id=rule.id,
        default_force=rule.force,
        service=values["service_code"],
        keys=[name for name in rule.parameters if name in LIMIT_DIMENSION],
    )
    if rule.shall_where is None:
        return force
    names = [name for name in parameter_names(rule.shall_where) if name != "value"]
    must = rule.shall_where(value=value, **{name: values[name] for name in names})
    return np.where(must, SHALL, force).astype(np.int8)


def judge(rule: Rule, values: Values) -> Judged:
    """Judge every line case by one rule.

    Only a finite value held against a finite limit, resting on nothing assumed beyond what the rule declares
    conservative, can be `meets`. A rule that raises leaves all its cases `not checked` and its fault told.
    """
    count = values.line_list.line_cases
    try:
        applies = applies_to(rule, values)
        value, limit = _value_and_limit(rule, values)
        force = _force(rule, values, value)
    except Exception as error:
        nothing = np.full(count, np.nan)
        outcome = np.full(count, Outcome.NOT_CHECKED, dtype=np.int8)
        force = np.full(count, FORCES.index(rule.force), dtype=np.int8)
        unsure = np.zeros(count, dtype=np.bool_)
        unknown = np.full(count, UNKNOWN, dtype=np.int8)
        return Judged(outcome, force, nothing, nothing, nothing, unsure, unknown, f"rule {rule.id} failed: {error!r}")
    judged = np.isfinite(value) & np.isfinite(limit)
    met = judged & _met(rule, value, limit)
    assumed = assumed_for(values, rule.parameters, conservative=rule.conservative)
    outcome = np.select(
        [applies == NO, applies == UNKNOWN, met & ~assumed, judged & ~met],
        [Outcome.NOT_APPLICABLE, Outcome.NOT_CHECKED, Outcome.MEETS, Outcome.DOES_NOT_MEET],
        Outcome.NOT_CHECKED,
    ).astype(np.int8)
    return Judged(outcome, force, value, limit, _utilisation(rule, value, limit), assumed, applies)


def judge_all(rules: tuple[Rule, ...], values: Values) -> Judgement:
    """Judge every line case by every rule."""
    judged = [judge(rule, values) for rule in rules]
    empty = np.zeros((0, values.line_list.line_cases))
    return Judgement(
        rules=rules,
        outcome=np.stack([each.outcome for each in judged]) if judged else empty.astype(np.int8),
        force=np.stack([each.force for each in judged]) if judged else empty.astype(np.int8),
        utilisation=np.stack([each.utilisation for each in judged]) if judged else empty,
        faults={rule.id: each.fault for rule, each in zip(rules, judged, strict=True) if each.fault},
    )
