"""What a review rests on: inputs, versions, methods, adopted criteria, assumptions, rules and services."""

from __future__ import annotations

import math
import platform
from importlib.metadata import PackageNotFoundError, version

import numpy as np

from checker.evaluation.assumptions import ASSUMABLE, shown_assumption
from checker.evaluation.values import Values
from checker.model import Source
from checker.outcome_rows import calculation_in_words
from checker.review_model import AssumptionItem, Basis, RuleSummary, ServiceMatch
from checker.ruling.contract import Outcome
from checker.ruling.run import Judgement
from checker.shown import shown_number

__all__ = ["ASSUMED_FIELDS", "UNMATCHED_WORDS", "assumption_items", "basis_of", "rule_summaries", "service_matches"]

UNMATCHED_WORDS = "(general row: nothing matched)"
_PACKAGES = ("linelist-checker", "numpy")
_METHODS = (
    ("Engineering Bernoulli balance", "energy of each line case", "Bird, Stewart, Lightfoot, Transport Phenomena, 7.4"),
    ("Colebrook-White", "turbulent friction factor; 64/Re below Re 2 000; the larger of both up to 4 000",
     "Colebrook, Journal of the Institution of Civil Engineers, 1939; Crane TP-410, critical zone"),
    ("Power-law profile", "kinetic-energy factor, 2 when laminar", "Nunner; exponent 1/n with n = 1/sqrt(f)"),
    ("K = n f_T", "losses of fittings", "Crane TP-410, 2009"),
    ("Isothermal compressible flow", "gas and steam, both ends, choking", "Crane TP-410, 2009, chapter 1"),
    ("Pipe dimensions", "outside diameter and wall by size and schedule", "ASME B36.10M and B36.19M"),
)  # fmt: skip
_TWO_PHASE = {
    "beggs-brill": (
        "Beggs and Brill",
        "two-phase pressure drop and hold-up",
        "Beggs and Brill, J. Pet. Technol., May 1973",
    ),
    "homogeneous": ("Homogeneous mixture", "two-phase pressure drop without slip", "no-slip mixture as one fluid"),
}
ASSUMED_FIELDS = ("schedule_used", "roughness", "compressibility", "heat_capacity_ratio")


def _version(package: str) -> str:
    try:
        return version(package)
    except PackageNotFoundError:
        return "not installed"


def _adopted(values: Values) -> tuple[tuple[str, str, str], ...]:
    criteria = values.criteria
    where = f"criteria {criteria.source.name}"
    rows = [
        ("atmospheric pressure", shown_number(criteria.atmosphere / 1e5, "bar"), where),
        ("gross factor", f"{criteria.gross_factor:g}", where),
        ("least coverage", f"{100.0 * criteria.coverage_minimum:g} %", where),
        ("tolerance on stated values", f"{100.0 * criteria.stated_values_tolerance:g} %", where),
        ("end at which a pressure holds", _pressure_end(values), "the list, else the service, else the inlet"),
        ("downhill recovery in two-phase lines", "allowed" if criteria.downhill_recovery else "not counted", where),
    ]
    if not math.isnan(criteria.fittings_allowance):
        rows.append(("fittings where the list has none", f"{criteria.fittings_allowance:g} of the length", where))
    rows += _roughness_rows(values)
    return tuple(rows)


def _pressure_end(values: Values) -> str:
    if values.line_list.has("pressure_basis"):
        return "as the list's own column says"
    return "the list has no column for it: the inlet, or the end that the service names"


def _roughness_rows(values: Values) -> list[tuple[str, str, str]]:
    """Return the roughness that was used for each material, and where it comes from."""
    material, roughness = values["material_used"], values["roughness"]
    rows = []
    for code, text in enumerate(material.texts):
        used = np.unique(roughness[(material.codes == code) & np.isfinite(roughness)])
        if used.size:
            shown = ", ".join(f"{1000.0 * value:.4g} mm" for value in used)
            rows.append(
                (f"roughness of {text}", shown, "list, class file, criteria or table of roughness, in that order")
            )
    return sorted(set(rows))


def basis_of(values: Values, *, deviations: Source | None, drawings: Source | None = None) -> Basis:
    """Return what the review rests on; `drawings` is the file of the lines on the drawings."""
    criteria = values.criteria
    inputs = [values.line_list.source, criteria.source]
    inputs += [source for source in (criteria.based_on_source, deviations, drawings) if source is not None]
    if values.classes is not None:
        inputs.insert(2, values.classes.source)
    versions = [("Python", platform.python_version()), *((package, _version(package)) for package in _PACKAGES)]
    methods = (*_METHODS, _TWO_PHASE[criteria.two_phase_method])
    return Basis(tuple(inputs), tuple(versions), methods, tuple(criteria.differences), _adopted(values))


def assumption_items(values: Values) -> tuple[AssumptionItem, ...]:
    """Return every value supplied for a line, once a line and field."""
    line_list = values.line_list
    items = []
    for field in ASSUMED_FIELDS:
        cases = np.flatnonzero(values[f"{field}_assumed"])
        _, first = np.unique(line_list.line[cases], return_index=True)
        for line_case in cases[first]:
            shown, source = shown_assumption(values, field, int(line_case))
            number = line_list.line_number[int(line_list.line[line_case])]
            items.append(AssumptionItem(number, "every case", ASSUMABLE[field], shown, source))
    return tuple(items)


def rule_summaries(judgement: Judgement) -> tuple[RuleSummary, ...]:
    """Return every rule with the counts of its outcomes."""
    return tuple(
        RuleSummary(
            rule=rule.id,
            title=rule.title,
            force=rule.force,
            source=str(rule.source),
            calculation=calculation_in_words(rule),
            origin=rule.origin,
            counts={outcome.words: int((judgement.outcome[index] == outcome).sum()) for outcome in Outcome},
        )
        for index, rule in enumerate(judgement.rules)
    )


def service_matches(values: Values) -> tuple[ServiceMatch, ...]:
    """Return how each service text of the list was matched, and on how many line cases it stands."""
    coded = values.line_list.text("service")
    codes = values["service_code"]
    names = [*(service.name for service in values.criteria.services), "not matched"]
    matches = []
    for code, text in enumerate(coded.texts):
        mine = coded.codes == code
        lines = np.unique(values.line_list.line[mine]).size
        for found in np.unique(codes[mine]):
            general = found >= 0 and values.criteria.services[int(found)].general
            word = f"{names[int(found)]} {UNMATCHED_WORDS}" if general else names[int(found)]
            matches.append(ServiceMatch(text, word, int(lines)))
    return tuple(sorted(matches, key=lambda match: match.written.casefold()))
