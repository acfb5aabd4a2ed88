"""From converted columns to line cases: what holds for all cases, what belongs to one, and what is composite."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, field

import numpy as np

from checker.fields import Field
from checker.intake.case_kinds import case_kinds
from checker.intake.case_names import canonical_case
from checker.intake.converted import Converted, ConvertedNumbers, ConvertedTexts
from checker.intake.number_cells import AT_60_DEGF, KINEMATIC, SPECIFIC_GRAVITY
from checker.intake.planned import FLOWS, PlannedColumn
from checker.intake.texts import fold_words, place, shown
from checker.model import BoolArray, CodeArray, Coded, FloatArray, Gap, IntArray

__all__ = ["Assembly", "assemble"]

STATE_FIELDS = frozenset(
    {
        "pressure", "temperature", "density", "viscosity", "vapour_fraction", "compressibility", "liquid_density",
        "liquid_viscosity", "vapour_density", "vapour_viscosity",
    }
)  # fmt: skip
ONE_PHASE = frozenset({"gas", "vapour", "vapor", "vap", "liquid", "liq"})
DENSITY_OF = {"viscosity": "density", "liquid_viscosity": "liquid_density", "vapour_viscosity": "vapour_density"}


@dataclass
class Assembly:
    """Arrays over the line cases, as `checker.model.LineList` holds them.

    `highs` and `lowest` hold, by field and line case, the upper ends of ranges and the lowest design values.
    """

    file: str
    rows: IntArray
    line: IntArray
    case: Coded
    case_kind: CodeArray
    composite: BoolArray
    numbers: dict[str, FloatArray] = field(default_factory=dict)
    texts: dict[str, Coded] = field(default_factory=dict)
    gaps: dict[str, CodeArray] = field(default_factory=dict)
    refusals: dict[tuple[str, int], str] = field(default_factory=dict)
    highs: dict[tuple[str, int], float] = field(default_factory=dict)
    lowest: dict[tuple[str, int], float] = field(default_factory=dict)


@dataclass(frozen=True)
class _Grid:
    """Lines by cases: a line case is `line * cases + case`."""

    lines: int
    cases: tuple[str, ...]
    rows: IntArray
    file: str
    header_row: int


def _column_for(columns: Sequence[PlannedColumn], case: str) -> PlannedColumn | None:
    """Return the column of a field that holds for a case: the one that names it, else the one that names none."""
    return next((c for c in columns if c.case == case), next((c for c in columns if not c.case), None))


def _refusal_texts(column: PlannedColumn, converted: Converted, grid: _Grid, case: int, into: Assembly) -> None:
    step, name = len(grid.cases), column.field.name
    whole = converted.column_refusal if isinstance(converted, ConvertedNumbers) else ""
    if whole:
        sentence = f"{place(grid.file, grid.header_row, column.header)}: {whole}"
        mine = np.flatnonzero(converted.gaps == Gap.REFUSED) * step + case
        into.refusals.update(dict.fromkeys(((name, index) for index in mine.tolist()), sentence))
    for line, sentence in converted.placed(place(grid.file), shown(column.header), grid.rows).items():
        into.refusals[name, line * step + case] = sentence


def _spread_numbers(
    field_: Field,
    columns: Sequence[PlannedColumn],
    converted: Mapping[int, Converted],
    grid: _Grid,
    into: Assembly,
) -> CodeArray:
    """Write a number field over the line cases; return what its values still rest on."""
    steps = len(grid.cases)
    by_case = [_column_for(columns, case) for case in grid.cases]
    values, gaps = np.empty((grid.lines, steps)), np.empty((grid.lines, steps), dtype=np.int8)
    rests_on = np.zeros((grid.lines, steps), dtype=np.int8)
    for position, column in enumerate(by_case):
        if column is None:
            values[:, position] = np.nan
            gaps[:, position] = Gap.NOT_APPLICABLE if field_.one_case else Gap.BLANK
            continue
        mine = converted[column.index]
        assert isinstance(mine, ConvertedNumbers)
        values[:, position], gaps[:, position] = mine.values, mine.gaps
        if mine.rests_on.any():
            rests_on[:, position] = mine.rests_on
        _refusal_texts(column, mine, grid, position, into)
        for sparse, spread in ((mine.highs, into.highs), (mine.lowest, into.lowest)):
            spread.update({(field_.name, line * steps + position): value for line, value in sparse.items()})
    into.numbers[field_.name], into.gaps[field_.name] = values.ravel(), gaps.ravel()
    return rests_on.ravel()


def _spread_texts(column: PlannedColumn, converted: Converted, grid: _Grid, into: Assembly) -> None:
    assert isinstance(converted, ConvertedTexts)
    step = len(grid.cases)
    into.texts[column.field.name] = Coded(np.repeat(converted.coded.codes, step), converted.coded.texts)
    into.gaps[column.field.name] = np.repeat(converted.gaps, step)
    for position in range(step):
        _refusal_texts(column, converted, grid, position, into)


def _refuse(name: str, indices: IntArray, reason: str, columns: Sequence[PlannedColumn], into: Assembly) -> None:
    into.numbers[name][indices] = np.nan
    into.gaps[name][indices] = Gap.REFUSED
    for index in indices.tolist():
        column = _column_for(columns, into.case.text(index)) or columns[0]
        where = place(into.file, int(into.rows[into.line[index]]), column.header)
        into.refusals[name, index] = f"{where}: {reason}"
        into.highs.pop((name, index), None)


def _with_density(name: str, rests_on: CodeArray, columns: Sequence[PlannedColumn], into: Assembly) -> None:
    """Turn kinematic viscosities into dynamic ones with the density of the same line case."""
    mine = (rests_on == KINEMATIC) & (into.gaps[name] == Gap.GIVEN)
    if not mine.any():
        return
    of = DENSITY_OF[name]
    varying = np.array([index for index in np.flatnonzero(mine).tolist() if (of, index) in into.highs], dtype=np.int32)
    both_ends = (
        f"a kinematic viscosity beside a {of.replace('_', ' ')} with two values has another dynamic viscosity at each: "
        "write the dynamic viscosity (cP), or give one value per case."
    )
    _refuse(name, varying, both_ends, columns, into)
    mine[varying] = False
    density = into.numbers.get(of, np.full(mine.shape, np.nan))
    into.numbers[name][mine] *= density[mine]
    for field_name, index in [key for key in into.highs if key[0] == name and mine[key[1]]]:
        into.highs[field_name, index] *= float(density[index])
    reason = f"a kinematic viscosity needs the {of.replace('_', ' ')} of the same row."
    _refuse(name, np.flatnonzero(mine & ~np.isfinite(density)).astype(np.int32), reason, columns, into)


def _water_or_air(name: str, rests_on: CodeArray, columns: Sequence[PlannedColumn], into: Assembly) -> None:
    """Refuse a specific gravity wherever the fluid is not stated to be liquid."""
    phase = into.texts.get("phase")
    liquid = (
        phase.where([text == "liquid" for text in phase.texts]) if phase is not None else np.zeros(rests_on.shape, bool)
    )
    liquid = liquid | (name == "liquid_density")
    wrong = (rests_on == SPECIFIC_GRAVITY) & (into.gaps[name] == Gap.GIVEN) & ~liquid
    reason = "a specific gravity may stand on water or on air where the phase is not liquid: give the density in kg/m3."
    _refuse(name, np.flatnonzero(wrong).astype(np.int32), reason, columns, into)


def _one_phase_flows(name: str, columns: Sequence[PlannedColumn], into: Assembly) -> None:
    """Refuse a flow that its header calls the liquid's or the gas's where the line is two-phase: it is a part."""
    phase = into.texts.get("phase")
    if phase is None or not any(map(_of_one_phase, columns)):
        return
    cases = np.array([_of_one_phase(_column_for(columns, text)) for text in (*into.case.texts, "")], dtype=np.bool_)
    wrong = phase.where([text == "two-phase" for text in phase.texts]) & cases[into.case.codes]
    wrong &= into.gaps[name] == Gap.GIVEN
    reason = "the flow of one phase is not that of a two-phase line: give the whole flow and the vapour mass fraction."
    _refuse(name, np.flatnonzero(wrong).astype(np.int32), reason, columns, into)


def _of_one_phase(column: PlannedColumn | None) -> bool:
    if column is None or column.hinted:
        return False
    return not ONE_PHASE.isdisjoint(fold_words(column.header).split())


def _at_60_degf(name: str, rests_on: CodeArray, columns: Sequence[PlannedColumn], into: Assembly) -> None:
    """Refuse a density in degrees API, which holds at 60 degF by definition and not at the flowing temperature."""
    mine = (rests_on == AT_60_DEGF) & (into.gaps[name] == Gap.GIVEN)
    for index in np.flatnonzero(mine).astype(np.int32):
        reason = (
            f"degrees API give the density at 60 degF (15.6 degC), here {into.numbers[name][index]:.1f} kg/m3, not the "
            "one at the flowing temperature: give that in kg/m3."
        )
        _refuse(name, np.array([index]), reason, columns, into)


def _case_codes(case_column: Coded | None, cases: Sequence[str], lines: int) -> Coded:
    if case_column is None:
        return Coded(np.tile(np.arange(len(cases), dtype=np.int32), lines), tuple(cases))
    names = [canonical_case(text) or text for text in case_column.texts]
    codes: dict[str, int] = {}
    table = np.array([*(codes.setdefault(name, len(codes)) for name in names), -1], dtype=np.int32)
    return Coded(table[case_column.codes], tuple(codes))


def _composite(columns: Mapping[str, Sequence[PlannedColumn]], cases: Sequence[str], lines: int) -> BoolArray:
    """Return where a case has a flow of its own beside a shared pressure, temperature or property."""

    def own(names: Sequence[str], case: str) -> bool:
        return any(column.case == case for name in names for column in columns.get(name, ()))

    def shared(name: str, case: str) -> bool:
        column = _column_for(columns.get(name, ()), case)
        return column is not None and not column.case

    mixed = [
        len(cases) > 1 and case != "normal" and own(FLOWS, case) and any(shared(name, case) for name in STATE_FIELDS)
        for case in cases
    ]
    return np.tile(np.array(mixed, dtype=np.bool_), lines)


def _own_flows(
    columns: Mapping[str, Sequence[PlannedColumn]], cases: Sequence[str], lines: int
) -> dict[str, BoolArray]:
    """Return where the column of each flow names the case."""
    own = {}
    for name in (name for name in FLOWS if name in columns):
        mine = [any(column.case == case for column in columns[name]) for case in cases]
        own[name] = np.tile(np.array(mine, dtype=np.bool_), lines)
    return own


def assemble(
    columns: Sequence[PlannedColumn],
    converted: Mapping[int, Converted],
    *,
    cases: Sequence[str],
    rows: IntArray,
    file: str,
    header_row: int,
) -> Assembly:
    """Spread the columns over the line cases.

    Parameters
    ----------
    columns : sequence of PlannedColumn
        Columns read.
    converted : mapping of int to converted column
        Their values, one a line, by index of the column.
    cases : sequence of str
        Cases that columns name; empty where a case column or nothing names them.
    rows : int array, shape (lines,)
        Row of each line.
    file : str
        Name of the file, for the sentences of refusals.
    header_row : int
        Row of the headers, where the sentence on a whole column points.
    """
    grid = _Grid(rows.size, tuple(cases) or ("normal",), rows, file, header_row)
    by_field: dict[str, list[PlannedColumn]] = {}
    for column in columns:
        by_field.setdefault(column.field.name, []).append(column)
    case_column = next((converted[column.index] for column in by_field.get("case", ())), None)
    case = _case_codes(case_column.coded if isinstance(case_column, ConvertedTexts) else None, grid.cases, grid.lines)
    line = np.repeat(np.arange(grid.lines, dtype=np.int32), len(grid.cases))
    composite = _composite(by_field, grid.cases, grid.lines)
    into = Assembly(file, rows, line, case, np.zeros(line.shape, dtype=np.int8), composite)
    rests_on = {}
    for name, mine in by_field.items():
        if mine[0].field.kind == "text":
            _spread_texts(mine[0], converted[mine[0].index], grid, into)
        else:
            rests_on[name] = _spread_numbers(mine[0].field, mine, converted, grid, into)
    for name in (name for name in rests_on if name.endswith("density")):
        _water_or_air(name, rests_on[name], by_field[name], into)
        _at_60_degf(name, rests_on[name], by_field[name], into)
    for name in (name for name in rests_on if name in DENSITY_OF):
        _with_density(name, rests_on[name], by_field[name], into)
    for name in (name for name in FLOWS if name in by_field):
        _one_phase_flows(name, by_field[name], into)
    own = _own_flows(by_field, grid.cases, grid.lines)
    into.case_kind = case_kinds(case, line, _flowing(into), into.gaps, own)
    return into


def _flowing(into: Assembly) -> Mapping[str, FloatArray]:
    """Return the numbers with the upper end of each flow that is a range: one from zero up is a flow."""
    numbers = dict(into.numbers)
    for name, index in (key for key in into.highs if key[0] in FLOWS):
        if numbers[name] is into.numbers[name]:
            numbers[name] = into.numbers[name].copy()
        numbers[name][index] = into.highs[name, index]
    return numbers
