"""Why a field of a line case is not there: the first cell that would have to be filled, named with its address."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np

from checker.evaluation.data_reasons import BY_PHASE, DATA_NEEDS
from checker.evaluation.dependencies import direct
from checker.evaluation.identity import LEAST_LIQUID_DENSITY
from checker.evaluation.line_number_state import why_not_compared
from checker.evaluation.values import Values
from checker.fields import Field, field_named
from checker.fluid.gas_density import GREATEST_GAS_DENSITY
from checker.hydraulics.compose import STATUS_SENTENCES
from checker.hydraulics.fittings import read_fittings
from checker.model import Coded, Gap, Phase
from checker.pipe.sizes import normalised_schedule

__all__ = ["Reason", "is_missing", "why_missing"]

Special = Callable[[Values, int], str]
Reason = str
LONGEST_CELL = 60
_DEEPEST = 12


def is_missing(values: Values, name: str, line_case: int) -> bool:
    """Return whether a field of a line case has no value (NaN, a negative code, no text)."""
    held = values[name]
    if isinstance(held, Coded):
        return bool(held.codes[line_case] < 0)
    if not isinstance(held, np.ndarray):
        return False
    number = held[line_case]
    return bool(number < 0) if np.issubdtype(held.dtype, np.signedinteger) else not bool(np.isfinite(number))


def _field(name: str) -> Field | None:
    try:
        return field_named(name.removesuffix("_listed").removesuffix("_gap"))
    except KeyError:
        return None


def _quoted(text: str) -> str:
    shown = "".join(mark if mark.isprintable() else mark.encode("unicode_escape").decode() for mark in text)
    return f"'{shown[:LONGEST_CELL]}...'" if len(shown) > LONGEST_CELL else f"'{shown}'"


def gap_sentence(values: Values, field: str, line_case: int) -> Reason:
    """Return why a listed field is missing, with the cell's address."""
    line_list = values.line_list
    gap = Gap(int(line_list.gap(field)[line_case]))
    address = line_list.address(field, line_case)
    if gap == Gap.NO_COLUMN or address is None:
        return f"{field}: the list has no such column"
    written = _quoted(line_list.cell(field, line_case))
    refused = line_list.refusals.get((field, line_case), f"{written} could not be read")
    words = {
        Gap.BLANK: "is blank",
        Gap.HOLD: f"is on HOLD ({written})",
        Gap.NOT_APPLICABLE: f"says not applicable ({written})",
        Gap.REFUSED: f"was refused: {refused}",
    }
    return f"{field} {words.get(gap, 'is missing')} ({address})"


def _first_gap(values: Values, fields: tuple[str, ...], line_case: int) -> Reason:
    """Return the sentence of the first field on HOLD or refused, else that none of the alternatives is given."""
    line_list = values.line_list
    for wanted in (Gap.HOLD, Gap.REFUSED):
        for field in fields:
            if line_list.gap(field)[line_case] == wanted:
                return gap_sentence(values, field, line_case)
    there = [field for field in fields if line_list.has(field)]
    if len(there) == 1:
        return gap_sentence(values, there[0], line_case)
    return f"none of {', '.join(fields)} is given"


def _flow(values: Values, line_case: int) -> Reason:
    listed = ("flow_mass", "flow_volume", "flow_standard")
    gaps = {field: Gap(int(values.line_list.gap(field)[line_case])) for field in listed}
    if Gap.HOLD in gaps.values() or Gap.REFUSED in gaps.values():
        return _first_gap(values, listed, line_case)
    if values["flow_contradictory"][line_case]:
        return "the flows of this row contradict each other by more than 2 % (flow_mass, flow_volume, flow_standard)"
    if gaps["flow_volume"] == Gap.GIVEN:
        return why_missing(values, "density_stated", line_case)
    if gaps["flow_standard"] == Gap.GIVEN:
        return why_missing(values, "molar_mass", line_case)
    return _first_gap(values, listed, line_case)


def _phase(values: Values, line_case: int) -> Reason:
    if not values["phase_contradictory"][line_case]:
        return gap_sentence(values, "phase", line_case)
    said = values["phase_listed"].text(line_case)
    for field in ("vapour_fraction", "vapour_fraction_outlet", "density", "vapour_density"):
        if not is_missing(values, f"{field}_listed", line_case) and _contradicts(values, field, said, line_case):
            cell = _quoted(values.line_list.cell(field, line_case))
            return f"the list calls it {said}, but {field} says {cell} ({values.line_list.address(field, line_case)})"
    return f"the list calls it {said}, but the row contradicts that"


def _contradicts(values: Values, field: str, said: str, line_case: int) -> bool:
    number = float(values[f"{field}_listed"][line_case])
    if said == "two-phase":
        return field == "vapour_density" or number in (0.0, 1.0)
    if field.startswith("vapour_fraction"):
        return number > 0.0 if said == "liquid" else number < 1.0
    if field == "vapour_density":
        return False
    return number < LEAST_LIQUID_DENSITY if said == "liquid" else number > GREATEST_GAS_DENSITY


def _relief(values: Values, line_case: int) -> Reason:
    code = int(values["service_code"][line_case])
    service = values.criteria.services[code]
    return (
        f"a relief line is judged on its relief load: a case {service.relief_case!r} with a flow not below those of "
        "its other cases is not given"
    )


def _flowing(values: Values, line_case: int) -> Reason:
    if is_missing(values, "relief_load_given", line_case):
        return _relief(values, line_case)
    return _case(values, line_case)


def _vapour_fraction(values: Values, line_case: int) -> Reason:
    if is_missing(values, "vapour_fraction_listed", line_case):
        return gap_sentence(values, "vapour_fraction", line_case)
    return gap_sentence(values, "vapour_fraction_outlet", line_case)


def _pressure_lowest(values: Values, line_case: int) -> Reason:
    for name in ("pressure", "pressure_outlet", "pressure_inlet"):
        if is_missing(values, name, line_case):
            return why_missing(values, name, line_case)
    return gap_sentence(values, "pressure", line_case)


def _density(values: Values, line_case: int) -> Reason:
    if values["density_contradictory"][line_case] and is_missing(values, "density_listed", line_case):
        return f"P M / (Z R T) of this row is above {GREATEST_GAS_DENSITY:g} kg/m3: that is no gas"
    if values["density_contradictory"][line_case]:
        return "the listed density differs by more than 5 % from P M / (Z R T) of the same row"
    if values["phase"][line_case] != Phase.GAS or values.line_list.gap("density")[line_case] in (Gap.HOLD, Gap.REFUSED):
        return gap_sentence(values, "density", line_case)
    for name in ("pressure", "temperature", "molar_mass"):
        if is_missing(values, name, line_case):
            return f"no density is listed and {gap_sentence(values, name, line_case)}"
    return "no density is listed, and without compressibility the ideal gas is not assumed at 10 bar or above"


def _bore(values: Values, line_case: int) -> Reason:
    for field in ("inside_diameter", "wall_thickness", "outside_diameter", "schedule", "piping_class", "size"):
        if values.line_list.gap(field)[line_case] in (Gap.HOLD, Gap.REFUSED):
            return gap_sentence(values, field, line_case)
    if is_missing(values, "size", line_case) and is_missing(values, "outside_diameter", line_case):
        return gap_sentence(values, "size", line_case)
    if values["pipe_contradictory"][line_case]:
        return _pipe_contradiction(values, line_case)
    if is_missing(values, "schedule_used", line_case):
        return "neither schedule nor wall thickness is given"
    schedule = values["schedule_used"].text(line_case)
    return f"NPS {values['size'][line_case]:g} has no schedule {_quoted(schedule)} in ASME B36.10M / B36.19M"


def _pipe_contradiction(values: Values, line_case: int) -> Reason:
    shown = {
        name: f"{1000.0 * float(values[name][line_case]):.4g} mm" for name in ("outside_diameter", "wall_thickness")
    }
    bore = float(values["inside_diameter_listed"][line_case])
    said = f"inside {1000.0 * bore:.4g} mm, " if np.isfinite(bore) else ""
    schedule = values["schedule_used"].text(line_case) or "none"
    return (
        f"size and dimensions contradict each other: NPS {values['size'][line_case]:g}, schedule {_quoted(schedule)}, "
        f"{said}outside {shown['outside_diameter']}, wall {shown['wall_thickness']}"
    )


def _schedule(values: Values, line_case: int) -> Reason:
    for field in ("schedule", "piping_class", "size"):
        if values.line_list.gap(field)[line_case] in (Gap.HOLD, Gap.REFUSED):
            return gap_sentence(values, field, line_case)
    if is_missing(values, "size", line_case):
        return gap_sentence(values, "size", line_case)
    schedule = values["schedule_used"].text(line_case)
    if schedule and not normalised_schedule(schedule):
        return f"schedule {_quoted(schedule)} is none that ASME B36.10M or B36.19M names"
    return "neither the list nor the class gives a schedule, so that there is none to look up"


def _roughness(values: Values, line_case: int) -> Reason:
    for field in ("roughness", "material", "piping_class"):
        if values.line_list.gap(field)[line_case] in (Gap.HOLD, Gap.REFUSED):
            return gap_sentence(values, field, line_case)
    material = values["material_used"].text(line_case)
    if material:
        return f"no roughness is adopted for material {_quoted(material)}"
    return "neither the list nor the class gives a material or a roughness"


def _route(values: Values, line_case: int) -> Reason:
    for field in ("equivalent_length", "fittings"):
        if values.line_list.gap(field)[line_case] in (Gap.HOLD, Gap.REFUSED):
            return gap_sentence(values, field, line_case)
    cell = values["fittings"].text(line_case)
    if not is_missing(values, "equivalent_length", line_case) and not cell:
        return f"equivalent_length is less than length ({values.line_list.address('equivalent_length', line_case)})"
    if cell:
        said = read_fittings([cell]).reasons[0] or "contradict an equivalent length no longer than the straight one"
        return f"fittings: {said} ({values.line_list.address('fittings', line_case)})"
    return _first_gap(values, ("equivalent_length", "fittings"), line_case)


def _elevation(values: Values, line_case: int) -> Reason:
    if is_missing(values, "elevation_change", line_case):
        return gap_sentence(values, "elevation_change", line_case)
    address = values.line_list.address("elevation_change", line_case)
    return f"elevation_change is more than the length of the line ({address})"


def _length(values: Values, line_case: int) -> Reason:
    return _first_gap(values, ("length", "equivalent_length"), line_case)


def _basis(values: Values, line_case: int) -> Reason:
    if values.line_list.has("pressure_basis"):
        return gap_sentence(values, "pressure_basis", line_case)
    return why_missing(values, "service_code", line_case)


def _service(values: Values, line_case: int) -> Reason:
    if is_missing(values, "service_listed", line_case):
        return gap_sentence(values, "service", line_case)
    if is_missing(values, "phase", line_case):
        return _phase(values, line_case)
    text = values["service_listed"].text(line_case)
    if values["service_code_assumed"][line_case]:
        return f"service {_quoted(text)} matches none of the criteria"
    return f"the criteria hold no service for {_quoted(text)} and no general row for its phase"


def _npsh_at_flow(values: Values, line_case: int) -> Reason:
    for name in ("npsh_required", "npsh_required_flow", "flow_volume_flowing"):
        if is_missing(values, name, line_case):
            return why_missing(values, name, line_case)
    flow = values["flow_volume_flowing"][line_case] * 3600.0
    quoted = values["npsh_required_flow"][line_case] * 3600.0
    return f"the case's flow {flow:.4g} m3/h is above the {quoted:.4g} m3/h at which NPSH required is quoted"


def _stated(values: Values, line_case: int) -> Reason:
    pairs = (
        ("velocity_stated", "velocity_at_stated_pressure"),
        ("pressure_drop_stated", "pressure_loss"),
        ("pressure_gradient_stated", "pressure_gradient"),
    )
    for stated, computed in pairs:
        gap = Gap(int(values.line_list.gap(stated)[line_case]))
        if gap in (Gap.BLANK, Gap.HOLD, Gap.REFUSED):
            return gap_sentence(values, stated, line_case)
        if gap == Gap.GIVEN and is_missing(values, computed, line_case):
            return why_missing(values, computed, line_case)
    return "the stated values cannot be compared"


def _case(values: Values, line_case: int) -> Reason:
    return gap_sentence(values, "case", line_case)


def _at_minimum(values: Values, line_case: int) -> Reason:
    if is_missing(values, "is_minimum_case", line_case):
        return _case(values, line_case)
    if values["is_minimum_case"][line_case] > 0:
        if is_missing(values, "velocity", line_case):
            return why_missing(values, "velocity", line_case)
        return "the minimum flow is above the flow of another continuous case of the line: it is no minimum"
    return "the line has no minimum case: minimum velocity is judged at the lowest sustained flow"


def _sand(values: Values, line_case: int) -> Reason:
    if not is_missing(values, "sand_rate", line_case):
        address = values.line_list.address("sand_rate", line_case)
        return f"sand is stated ({address}): C / sqrt(rho) is for solids-free flow"
    return gap_sentence(values, "sand_rate", line_case)


def _number_against_columns(values: Values, line_case: int) -> Reason:
    sentence, field = why_not_compared(values, line_case)
    return gap_sentence(values, field, line_case) if field else sentence


_SPECIAL: dict[str, Special] = {
    "flow_mass": _flow,
    "density_stated": _density,
    "inside_diameter": _bore,
    "schedule_exists": _schedule,
    "schedule_given": _schedule,
    "phase": _phase,
    "pump_suction": _service,
    "flowing": _flowing,
    "relief_load_given": _relief,
    "vapour_fraction": _vapour_fraction,
    "pressure_lowest": _pressure_lowest,
    "roughness": _roughness,
    "pipe_length": _length,
    "elevation_along": _elevation,
    "fittings_length": _route,
    "fittings_n": _route,
    "fittings_k": _route,
    "pressure_basis": _basis,
    "service_code": _service,
    "npsh_required_at_flow": _npsh_at_flow,
    "stated_difference": _stated,
    "case_kind": _case,
    "number_against_columns": _number_against_columns,
    "number_pattern_known": _number_against_columns,
    "velocity_at_minimum": _at_minimum,
    "sand_free": _sand,
}


def _data_rule(values: Values, name: str, line_case: int) -> Reason:
    """Return the first open cell behind a field of a data rule; HOLD and refused before blank."""
    needs = DATA_NEEDS[name]
    if name in BY_PHASE and values["phase_contradictory"][line_case]:
        return _phase(values, line_case)
    for wanted in (Gap.HOLD, Gap.REFUSED, Gap.BLANK, Gap.NOT_APPLICABLE):
        for field in needs.fields:
            if values.line_list.gap(field)[line_case] == wanted and values.line_list.address(field, line_case):
                return gap_sentence(values, field, line_case)
    return needs.otherwise


def why_missing(values: Values, name: str, line_case: int, depth: int = 0) -> Reason:
    """Return the sentence that says why a field of a line case has no value.

    Follows what stands behind the field in the order in which a reader would look; a solver that could not finish
    says so itself.
    """
    if name in _SPECIAL:
        return _SPECIAL[name](values, line_case)
    if name in DATA_NEEDS:
        return _data_rule(values, name, line_case)
    phase = int(values["phase"][line_case])
    for need in direct(name, phase):
        if depth < _DEEPEST and not need.endswith("_gap") and is_missing(values, need, line_case):
            return why_missing(values, need, line_case, depth + 1)
    if _field(name) is not None:
        return gap_sentence(values, name.removesuffix("_listed").removesuffix("_given"), line_case)
    return _solver_sentence(values, name, line_case)


def _solver_sentence(values: Values, name: str, line_case: int) -> Reason:
    status = int(values["status"][line_case])
    return STATUS_SENTENCES[status] if status > 0 else f"{name} could not be computed from the values given"
