"""Cells with two values: every combination of ends is a line case of its own, and nothing of the rest moves."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import replace
from pathlib import Path

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from lists import read, write

from checker.intake import read_line_list
from checker.intake.ranges import MOST_RANGES, expand
from checker.model import CaseKind, Coded, Column, Gap, LineList, Source, base_case

FIELDS = ("pressure", "temperature", "density", "viscosity", "flow_mass")


def _listed(lines: int = 3, cases: tuple[str, ...] = ("normal", "relief")) -> LineList:
    """Return a list whose value in a field is 100 x field + line case, one column a field."""
    count = lines * len(cases)
    numbers = {name: 100.0 * place + np.arange(count) for place, name in enumerate(FIELDS)}
    cells = tuple(f"{line}-9" for line in range(lines))
    return LineList(
        source=Source("list.csv", "0" * 64),
        columns=tuple(Column(name, name.title(), "", "", cells) for name in (*FIELDS, "pressure_design")),
        unmatched=(),
        notes=(),
        line_number=tuple(f"P-{line}" for line in range(lines)),
        row=np.arange(2, lines + 2, dtype=np.int32),
        line=np.repeat(np.arange(lines, dtype=np.int32), len(cases)),
        case=Coded(np.tile(np.arange(len(cases), dtype=np.int32), lines), cases),
        case_kind=np.tile(np.array([CaseKind.CONTINUOUS, CaseKind.INTERMITTENT], dtype=np.int8)[: len(cases)], lines),
        composite=np.arange(count) % 3 == 0,
        numbers={**numbers, "pressure_design": np.full(count, 1e6)},
        texts={"service": Coded(np.arange(count, dtype=np.int32), tuple(f"s{index}" for index in range(count)))},
        gaps={name: np.zeros(count, dtype=np.int8) for name in (*FIELDS, "pressure_design", "service")},
        refusals={("viscosity", index): f"refused {index}" for index in range(count)},
    )


def _old_index(listed: LineList) -> list[int]:
    """Return the line case from which each line case was made, by its service."""
    return [int(listed.text("service").text(index)[1:]) for index in range(listed.line_cases)]


def test_without_ranges_the_list_stays_as_it_is() -> None:
    listed = _listed()
    assert expand(listed, {}) is listed


def test_one_range_makes_two_line_cases() -> None:
    listed = _listed()
    found = expand(listed, {("pressure", 2): 9e5})
    names = [found.case.text(index) for index in range(found.line_cases)]
    assert names == [
        "normal",
        "relief",
        "normal, with low pressure",
        "normal, with high pressure",
        "relief",
        "normal",
        "relief",
    ]
    assert [base_case(name) for name in names] == ["normal", "relief", "normal", "normal", "relief", "normal", "relief"]
    assert found.line.tolist() == [0, 0, 1, 1, 1, 2, 2]
    assert found.number("pressure").tolist() == [0, 1, 2, 9e5, 3, 4, 5]
    assert found.number("temperature").tolist() == [100, 101, 102, 102, 103, 104, 105]
    assert found.case_kind.tolist() == [0, 1, 0, 0, 1, 0, 1]
    assert [(item.line_number, item.field, item.text, item.low, item.high) for item in found.ranges] == [
        ("P-1", "pressure", "1-9", 2.0, 9e5)
    ]
    assert str(found.ranges[0].address) == "list.csv, row 3, column 'Pressure'"


def test_three_ranges_make_every_combination_once() -> None:
    highs = {("pressure", 0): 1e6, ("temperature", 0): 1e3, ("density", 0): 2e3}
    found = expand(_listed(), highs)
    assert found.line_cases == 13
    mine = [tuple(found.number(name)[index] for name in FIELDS[:3]) for index in range(8)]
    assert sorted(mine) == sorted((p, t, d) for p in (0, 1e6) for t in (100, 1e3) for d in (200, 2e3))
    assert found.case.text(0) == "normal, with low pressure, low temperature and low density"
    assert found.case.text(1) == "normal, with high pressure, low temperature and low density"
    assert found.case.text(7) == "normal, with high pressure, high temperature and high density"
    for index in range(8):
        name = found.case.text(index)
        assert ("high pressure" in name) == (found.number("pressure")[index] == 1e6)
        assert ("high temperature" in name) == (found.number("temperature")[index] == 1e3)
        assert ("high density" in name) == (found.number("density")[index] == 2e3)


def test_more_than_three_ranges_are_refused() -> None:
    listed = _listed()
    assert MOST_RANGES == 3
    found = expand(listed, {(name, 2): 1e6 for name in FIELDS[:4]} | {("pressure", 4): 1e6})
    assert found.line_cases == 7
    for name in FIELDS[:4]:
        assert np.isnan(found.number(name)[2])
        assert found.gap(name)[2] == Gap.REFUSED
        assert found.refusals[name, 2] == (
            f"list.csv, row 3, column '{name.title()}': '1-9' states two values, as more than 3 cells of its row do: "
            "give one value per case."
        )
    assert found.number("flow_mass")[2] == 402
    assert [item.line_number for item in found.unread] == ["P-1"] * 4
    assert [item.line_number for item in found.ranges] == ["P-2"]
    assert not np.isnan(listed.number("pressure")).any()


def test_a_cell_shared_by_cases_is_one_item() -> None:
    found = expand(_listed(), {("pressure", 2): 1e6, ("pressure", 3): 1e6})
    assert len(found.ranges) == 1
    assert [found.case.text(index) for index in range(2, 6)] == [
        "normal, with low pressure", "normal, with high pressure", "relief, with low pressure", "relief, with high pressure",
    ]  # fmt: skip


def test_lower_design_value_has_a_field_of_its_own() -> None:
    listed = _listed()
    found = expand(listed, {}, {("pressure_design", 0): 0.0, ("pressure_design", 1): 0.0})
    assert found.line_cases == listed.line_cases
    assert found.number("pressure_design").tolist() == [1e6] * 6
    assert found.number("pressure_design_minimum")[:2].tolist() == [0.0, 0.0]
    assert np.isnan(found.number("pressure_design_minimum")[2:]).all()
    assert found.gap("pressure_design_minimum").tolist() == [Gap.GIVEN] * 2 + [Gap.NO_COLUMN] * 4
    assert str(found.address("pressure_design_minimum", 1)) == "list.csv, row 2, column 'Pressure_Design'"
    assert not found.ranges


def test_own_column_of_the_lowest_design_value_wins() -> None:
    listed = _listed()
    numbers = {**listed.numbers, "pressure_design_minimum": np.array([5e4, np.nan, np.nan, 5e4, 5e4, 5e4])}
    gaps = {**listed.gaps, "pressure_design_minimum": np.array([0, Gap.BLANK, Gap.HOLD, 0, 0, 0], dtype=np.int8)}
    columns = (*listed.columns, Column("pressure_design_minimum", "Lowest", "", "", ("", "", "")))
    own = replace(listed, numbers=numbers, gaps=gaps, columns=columns)
    found = expand(own, {}, {("pressure_design", index): 0.0 for index in range(3)})
    assert found.number("pressure_design_minimum")[:2].tolist() == [5e4, 0.0]
    assert found.gap("pressure_design_minimum").tolist() == [0, 0, Gap.HOLD, 0, 0, 0]
    assert found.columns == columns


@settings(max_examples=100, deadline=None)
@given(st.dictionaries(st.tuples(st.sampled_from(FIELDS), st.integers(0, 7)), st.floats(1e4, 1e6), max_size=16))
def test_expansion_keeps_every_line_case_and_all_it_says(highs: Mapping[tuple[str, int], float]) -> None:
    listed = _listed(4)
    found = expand(listed, highs)
    old = _old_index(found)
    assert old == sorted(old)
    ranged: dict[int, list[str]] = {}
    for name, index in highs:
        ranged.setdefault(index, []).append(name)
    for index in range(listed.line_cases):
        names = ranged.get(index, [])
        crowded = len(names) > MOST_RANGES
        mine = [new for new, from_ in enumerate(old) if from_ == index]
        assert len(mine) == (1 if crowded else 2 ** len(names))
        assert len({found.case.text(new) for new in mine}) == len(mine)
        assert {base_case(found.case.text(new)) for new in mine} == {listed.case.text(index)}
        for name in FIELDS:
            ends = {float(listed.number(name)[index])} | ({highs[name, index]} if name in names else set())
            if crowded and name in names:
                assert found.gap(name)[mine[0]] == Gap.REFUSED
                assert (name, mine[0]) in found.refusals
            else:
                assert set(found.number(name)[mine].tolist()) == ends
        kept = {found.refusals["viscosity", new] for new in mine}
        assert kept == {f"refused {index}"} or (crowded and "viscosity" in names)
        assert (found.case_kind[mine] == listed.case_kind[index]).all()
        assert (found.composite[mine] == listed.composite[index]).all()
        assert (found.line[mine] == listed.line[index]).all()


HEADER = "Line No,Size (NPS),Flow [kg/h],Oper Press [barg],Oper Temp [degC],Density [kg/m3],Des Press [barg],Des Temp [degC]\n"


def test_ranges_of_a_list(tmp_path: Path) -> None:
    listed = read(tmp_path, f"{HEADER}P-1,6,50000,5-7,-29 to 38,983,3.5/FV,-29/60\nP-2,6,50000,4.5,60,983,10,90\n")
    assert listed.line_number == ("P-1", "P-2")
    assert listed.line.tolist() == [0, 0, 0, 0, 1]
    assert [listed.case.text(index) for index in range(5)] == [
        "normal, with low pressure and low temperature", "normal, with high pressure and low temperature",
        "normal, with low pressure and high temperature", "normal, with high pressure and high temperature", "normal",
    ]  # fmt: skip
    assert listed.number("pressure") == pytest.approx([6e5, 8e5, 6e5, 8e5, 5.5e5])
    assert listed.number("temperature") == pytest.approx([244.15, 244.15, 311.15, 311.15, 333.15])
    assert listed.number("pressure_design") == pytest.approx([4.5e5] * 4 + [11e5])
    assert listed.number("pressure_design_minimum")[:4] == pytest.approx(0.0)
    assert listed.number("temperature_design") == pytest.approx([333.15] * 4 + [363.15])
    assert listed.number("temperature_design_minimum")[:4] == pytest.approx(244.15)
    assert not listed.unread
    assert [(item.field, item.text) for item in listed.ranges] == [("pressure", "5-7"), ("temperature", "-29 to 38")]


def test_full_vacuum_alone_in_a_list(tmp_path: Path) -> None:
    listed = read(tmp_path, f"{HEADER}P-1,6,50000,5,38,983,FV,60\n")
    assert listed.gap("pressure_design")[0] == Gap.REFUSED
    assert "write the design pressure too" in listed.refusals["pressure_design", 0]
    assert listed.number("pressure_design_minimum")[0] == 0.0


def test_both_ends_must_be_possible(tmp_path: Path) -> None:
    listed = read(tmp_path, f"{HEADER}P-1,6,50000,5,38 to 9000,983,10,60\nP-2,6,50000,-2 to 5,38,983,10,60\n")
    assert listed.gap("temperature").tolist() == [Gap.REFUSED, Gap.GIVEN]
    assert listed.gap("pressure").tolist() == [Gap.GIVEN, Gap.REFUSED]
    assert "at or above" in listed.refusals["temperature", 0]
    assert "at or below" in listed.refusals["pressure", 1]
    assert not listed.ranges


def test_ambient_of_the_site(tmp_path: Path) -> None:
    path = write(tmp_path, f"{HEADER}P-1,6,50000,5,AMB,983,10,60\n")
    listed = read_line_list(path, atmosphere=1e5, ambient=(263.15, 313.15))
    assert listed.number("temperature") == pytest.approx([263.15, 313.15])
    assert [listed.case.text(index) for index in range(2)] == [
        "normal, with low temperature",
        "normal, with high temperature",
    ]
    asked = read_line_list(path, atmosphere=1e5)
    assert asked.gap("temperature")[0] == Gap.REFUSED
    assert "ambient_minimum" in asked.refusals["temperature", 0]


def test_kinematic_viscosity_takes_the_density_at_both_ends(tmp_path: Path) -> None:
    text = "Line No,Flow [kg/h],Density [kg/m3],Viscosity [cSt]\nP-1,50000,900,10-20\nP-2,50000,900,10\n"
    listed = read(tmp_path, text)
    assert listed.number("viscosity") == pytest.approx([0.009, 0.018, 0.009])


def test_record_of_a_cell(tmp_path: Path) -> None:
    listed = read(tmp_path, f"{HEADER}P-1,6,50000,5-7,<38,983,10,60\n")
    record = listed.record("pressure", 1)
    assert record is not None
    assert (record.text, record.numbers, record.unit) == ("5-7", (5.0, 7.0), "barg")
    assert record.values == pytest.approx((6e5, 8e5))
    limit = listed.record("temperature", 0)
    assert limit is not None
    assert limit.values == pytest.approx((311.15,))
    assert "limit" in limit.remark


def test_ranges_of_several_flows_are_one_range_said_twice(tmp_path: Path) -> None:
    text = (
        "Line No,Flow [kg/h],Flow [m3/h],Oper Press [barg],Oper Temp [degC],Density [kg/m3],Viscosity [cP]\n"
        "P-1,1000-2000,1-2,4-5,30,1000,1\nP-2,1000-2000,5,4,30,1000,1\nP-3,1000-2000,1-2,4-5,30-40,1000-1001,1\n"
    )
    found = read(tmp_path, text)
    of_first = np.flatnonzero(found.line == 0)
    mass, volume = (found.number(name)[of_first] * scale for name, scale in (("flow_mass", 3.6), ("flow_volume", 3600)))
    assert mass.tolist() == pytest.approx(volume.tolist())
    assert sorted(found.case.text(int(index)) for index in of_first) == [
        "normal, with high flow and high pressure",
        "normal, with high flow and low pressure",
        "normal, with low flow and high pressure",
        "normal, with low flow and low pressure",
    ]
    assert found.case.text(int(np.flatnonzero(found.line == 1)[0])) == "normal, with low flow mass"
    assert len(found.ranges) == 4
    assert np.flatnonzero(found.line == 2).size == 1


@pytest.mark.parametrize(("viscosity", "value"), [("2", None), ("2-3", None), ("2 cP", 0.002)])
def test_a_kinematic_viscosity_beside_a_density_range_is_refused(
    tmp_path: Path, viscosity: str, value: float | None
) -> None:
    text = f"Line No,Flow [kg/h],Density [kg/m3],Viscosity [cSt]\nP-1,1000,800-900,{viscosity}\nP-2,1000,800,2-3\n"
    found = read(tmp_path, text)
    first, second = (np.flatnonzero(found.line == line) for line in (0, 1))
    assert found.number("viscosity")[second] == pytest.approx([0.0016, 0.0024])
    if value is None:
        assert set(found.gap("viscosity")[first].tolist()) == {Gap.REFUSED}
        assert "density with two values" in found.refusals["viscosity", 0]
        assert first.size == 2
    else:
        assert found.number("viscosity")[first] == pytest.approx([value] * 2)
