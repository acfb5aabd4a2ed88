"""The result of a review as tables: one row a line for people, DataFrames for programs."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import TYPE_CHECKING, Any

import numpy as np
from numpy.typing import NDArray

from checker.evaluation.hydraulic_state import HYDRAULIC_OUTPUTS
from checker.evaluation.values import Values
from checker.fields import all_fields
from checker.hydraulics.compose import FLOW_REGIMES
from checker.model import Coded, Phase
from checker.ruling.contract import Outcome
from checker.ruling.run import Judgement
from checker.shown import si_unit_of

if TYPE_CHECKING:
    import pandas as pd

__all__ = [
    "ResultRow", "ResultsTable", "UtilisationPoints", "VelocityPoints", "hydraulics_columns", "hydraulics_frame",
    "lines_frame", "result_rows", "utilisation_points", "velocity_points",
]  # fmt: skip

FloatArray = NDArray[np.float64]
NEAR_LIMIT = 0.9
PHASE_WORDS = {Phase.LIQUID: "liquid", Phase.GAS: "gas", Phase.TWO_PHASE: "two-phase", Phase.UNKNOWN: "not known"}
VELOCITY_RULES = ("liquid-velocity", "gas-velocity", "steam-velocity", "two-phase-velocity")
LOOKED_UP = (
    "outside_diameter",
    "wall_thickness",
    "inside_diameter",
    "roughness",
    "compressibility",
    "heat_capacity_ratio",
)


@dataclass(frozen=True, slots=True)
class ResultRow:
    """Results of one line, in the case that governs it; SI, NaN where there is none."""

    line_number: str
    row: int
    service: str
    phase: str
    size: str
    case: str
    velocity: float
    velocity_limit: float
    pressure_gradient: float
    pressure_loss: float
    dp_total: float
    mach: float
    momentum_flux: float
    utilisation: float
    governing_rule: str
    meets: int
    does_not_meet: int
    not_checked: int
    state: str


@dataclass(frozen=True, slots=True)
class ResultsTable:
    """Results of every line, in the order of the list."""

    rows: tuple[ResultRow, ...]


@dataclass(frozen=True, slots=True)
class UtilisationPoints:
    """Utilisation of every judged outcome, and the index of its rule in `rules`."""

    utilisation: FloatArray
    rule: NDArray[np.int32]
    rules: tuple[str, ...]


@dataclass(frozen=True, slots=True)
class VelocityPoints:
    """Velocity at the worst end, its limit, phase and outcome of every line case that has both."""

    velocity: FloatArray
    limit: FloatArray
    phase: NDArray[np.int8]
    outcome: NDArray[np.int8]


def hydraulics_columns(values: Values) -> list[tuple[str, str, FloatArray]]:
    """Return name, SI unit and values of every hydraulic column, as DESIGN names them."""
    names = [*HYDRAULIC_OUTPUTS, "erosional_velocity", "npsh_available"]
    columns = [(name, si_unit_of(name), np.asarray(values[name], dtype=np.float64)) for name in names]
    columns.append(("surge_rise", "Pa", np.full(values.line_list.line_cases, np.nan)))
    return columns


def flow_regimes(values: Values) -> list[str]:
    """Return the flow regime of each line case in words, empty where none is defined."""
    words = np.array([*FLOW_REGIMES, ""], dtype=object)
    return [str(word) for word in words[np.asarray(values["flow_regime"], dtype=np.int64)]]


def _index(values: Values) -> pd.MultiIndex:
    import pandas as pd

    line_list = values.line_list
    numbers = np.array(line_list.line_number, dtype=object)[line_list.line]
    cases = np.array([*line_list.case.texts, ""], dtype=object)[line_list.case.codes]
    return pd.MultiIndex.from_arrays([numbers, cases], names=["line_number", "case"])


def hydraulics_frame(values: Values) -> pd.DataFrame:
    """Return the hydraulics of every line case, indexed by line number and case."""
    import pandas as pd

    frame = pd.DataFrame({name: array for name, _, array in hydraulics_columns(values)}, index=_index(values))
    frame.insert(list(frame.columns).index("liquid_holdup") + 1, "flow_regime", flow_regimes(values))
    return frame


def lines_frame(values: Values) -> pd.DataFrame:
    """Return the list's fields in SI with what was looked up or assumed filled in, indexed by line number and case."""
    import pandas as pd

    columns: dict[str, Any] = {}
    for field in all_fields():
        if field.name in ("line_number", "case") or not values.line_list.has(field.name):
            continue
        columns[field.name] = _plain(values[field.name] if field.kind != "text" else values.line_list.text(field.name))
    columns |= {name: values[name] for name in LOOKED_UP}
    columns["flow_mass"] = values["flow_mass"]
    columns["density_listed"] = values["density_listed"]
    columns["density"] = np.where(np.isnan(values["density_stated"]), values["density"], values["density_stated"])
    columns["schedule"] = _plain(values["schedule_used"])
    columns["material"] = _plain(values["material_used"])
    return pd.DataFrame(columns, index=_index(values))


def _plain(held: Any) -> Any:
    if not isinstance(held, Coded):
        return held
    return np.array([*held.texts, ""], dtype=object)[held.codes]


def _counts_as_used(judgement: Judgement) -> NDArray[np.bool_]:
    """Return which outcomes say how much of a limit a line uses: those on its duty, and whatever does not meet.

    A test at just the pressure it must have uses none of the line's capacity.
    """
    on_duty = np.array([not rule.on_data for rule in judgement.rules], dtype=np.bool_)
    counts: NDArray[np.bool_] = on_duty[:, np.newaxis] | np.equal(judgement.outcome, Outcome.DOES_NOT_MEET)
    return counts


def utilisation_points(judgement: Judgement) -> UtilisationPoints:
    """Return the finite utilisation of every judged outcome on the lines' duty, and of all that do not meet."""
    judged = np.isfinite(judgement.utilisation) & np.isin(
        judgement.outcome, (Outcome.MEETS, Outcome.DOES_NOT_MEET, Outcome.APPROVED_DEVIATION)
    )
    judged &= _counts_as_used(judgement)
    rule, _ = np.nonzero(judged)
    return UtilisationPoints(
        judgement.utilisation[judged], rule.astype(np.int32), tuple(rule.id for rule in judgement.rules)
    )


def velocity_points(values: Values, judgement: Judgement) -> VelocityPoints:
    """Return velocity against its limit for every line case that a velocity rule judged."""
    outcome = np.full(values.line_list.line_cases, Outcome.NOT_APPLICABLE, dtype=np.int8)
    for index, rule in enumerate(judgement.rules):
        if rule.id in VELOCITY_RULES:
            outcome = np.where(outcome == Outcome.NOT_APPLICABLE, judgement.outcome[index], outcome)
    velocity, limit = _worst_velocity(values), values["velocity_maximum"]
    both = np.isfinite(velocity) & np.isfinite(limit) & (outcome != Outcome.NOT_APPLICABLE)
    return VelocityPoints(velocity[both], limit[both], values["phase"][both], outcome[both])


def _worst_velocity(values: Values) -> FloatArray:
    worst: FloatArray = values["velocity_highest"]
    return np.where(np.isnan(worst), values["velocity_at_stated_pressure"], worst)


def _state(counts: NDArray[np.int64], used: float) -> str:
    if counts[Outcome.DOES_NOT_MEET]:
        return Outcome.DOES_NOT_MEET.words
    if counts[Outcome.APPROVED_DEVIATION]:
        return Outcome.APPROVED_DEVIATION.words
    if counts[Outcome.NOT_CHECKED] or not counts[Outcome.MEETS]:
        return Outcome.NOT_CHECKED.words
    return "near limit" if used >= NEAR_LIMIT else Outcome.MEETS.words


def result_rows(values: Values, judgement: Judgement) -> ResultsTable:
    """Return one row a line: the case and rule with the highest utilisation, and the counts of its outcomes."""
    line_list = values.line_list
    used = np.where(np.isnan(judgement.utilisation), -1.0, judgement.utilisation)
    judged = np.isin(judgement.outcome, (Outcome.MEETS, Outcome.DOES_NOT_MEET)) & _counts_as_used(judgement)
    used = np.where(judged, used, -1.0)
    governing = used.argmax(axis=0) if used.size else np.zeros(line_list.line_cases, dtype=np.int64)
    worst = np.take_along_axis(used, governing[np.newaxis], axis=0)[0] if used.size else np.zeros(line_list.line_cases)
    order = np.lexsort((-worst, line_list.line))
    first = order[np.unique(line_list.line[order], return_index=True)[1]]
    counts = np.zeros((len(line_list.line_number), len(Outcome)), dtype=np.int64)
    for code in Outcome:
        np.add.at(counts[:, code], line_list.line, (judgement.outcome == code).sum(axis=0))
    velocity = _worst_velocity(values)
    return ResultsTable(
        tuple(
            _result_row(values, judgement, int(case), velocity, counts, float(worst[case]), int(governing[case]))
            for case in first
        )
    )


def _result_row(
    values: Values,
    judgement: Judgement,
    case: int,
    velocity: FloatArray,
    counts: NDArray[np.int64],
    used: float,
    governing: int,
) -> ResultRow:
    line_list = values.line_list
    line = int(line_list.line[case])
    size = float(values["size"][case])
    mine = counts[line]
    numbers = {
        name: float(values[name][case]) for name in ("pressure_gradient", "pressure_loss", "dp_total", "momentum_flux")
    }
    return ResultRow(
        line_number=line_list.line_number[line],
        row=int(line_list.row[line]),
        service=line_list.text("service").text(case),
        phase=PHASE_WORDS[Phase(int(values["phase"][case]))],
        size="" if math.isnan(size) else f"NPS {size:g}",
        case=line_list.case.text(case),
        velocity=float(velocity[case]),
        velocity_limit=float(values["velocity_maximum"][case]),
        mach=float(values["mach_highest"][case]),
        utilisation=used if used >= 0.0 else math.nan,
        governing_rule=judgement.rules[governing].id if used >= 0.0 else "",
        meets=int(mine[Outcome.MEETS]),
        does_not_meet=int(mine[Outcome.DOES_NOT_MEET]),
        not_checked=int(mine[Outcome.NOT_CHECKED]),
        state=_state(mine, used),
        **numbers,
    )
