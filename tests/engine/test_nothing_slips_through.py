"""Lists that once slipped through as `meets`, or without a word: each must be told."""

from __future__ import annotations

from pathlib import Path
from typing import Any

import pytest
from click.testing import CliRunner

import checker
from checker.cli import main
from checker.errors import InputError

LIQUID = "Line No,Service,Phase,Size (NPS),Sch,Flow [m3/h],Density [kg/m3],Viscosity [cP],Material"
GAS = (
    "Line No,Service,Phase,Size (NPS),Sch,Material,Flow [kg/h],Oper. Press. [barg],Oper. Temp. [degC],MW [kg/kmol],"
    "Z,Cp/Cv,Viscosity [cP],Length [m],Eq. Length [m],Elev. Change [m],Press. Basis"
)
# What they say of a row holds whatever its phase.
WHATEVER_THE_PHASE = ("schedule-exists", "doubled-line-number", "look-alike-number", "number-against-columns")


def reviewed(folder: Path, header: str, *rows: str, criteria: str = "") -> Any:
    path = folder / "list.csv"
    path.write_text("\n".join([header, *rows]) + "\n", encoding="utf-8")
    given = {}
    if criteria:
        given["criteria"] = folder / "criteria.toml"
        given["criteria"].write_text(criteria, encoding="utf-8")
    return checker.review(path, **given)


def outcomes(done: Any, rule: str) -> list[str]:
    frame = done.outcomes
    return list(frame.loc[frame["rule"] == rule, "outcome"])


def reason(done: Any, rule: str) -> str:
    frame = done.outcomes
    return str(frame.loc[frame["rule"] == rule, "reason"].iloc[0])


@pytest.mark.parametrize("case", ["normal", "continuous", ""])
def test_a_flare_line_on_its_purge_flow_is_not_checked(tmp_path: Path, case: str) -> None:
    row = "F1,flare header,gas,12,40,carbon steel,100,0.05,25,28.01,1,1.4,0.018,200,220,0,outlet"
    header, line = (f"{GAS},Case", f"{row},{case}") if case else (GAS, row)
    done = reviewed(tmp_path, header, line)
    assert outcomes(done, "mach-number") == ["not checked"]
    assert outcomes(done, "momentum-flux") == ["not checked"]
    assert "relief load" in reason(done, "mach-number")
    assert done.recommendation == "incomplete"


def test_a_flare_line_is_judged_on_its_relief_load(tmp_path: Path) -> None:
    row = "F1,flare header,gas,12,40,carbon steel,{},0.05,25,28.01,1,1.4,0.018,200,220,0,outlet,{}"
    done = reviewed(tmp_path, f"{GAS},Case", row.format(100, "normal"), row.format(500000, "relief"))
    assert "does not meet" in outcomes(done, "mach-number")
    done = reviewed(tmp_path, f"{GAS},Case", row.format(100, "normal"), row.format("NNF", "relief"))
    assert set(outcomes(done, "mach-number")) == {"not checked"}


def test_a_service_that_matches_nothing_cannot_meet(tmp_path: Path) -> None:
    done = reviewed(
        tmp_path,
        LIQUID,
        "A,P-101 suctoin,liquid,6,40,100,790,0.5,carbon steel",
        "B,P-101 suctoin,liquid,6,40,900,790,0.5,carbon steel",
    )
    assert outcomes(done, "liquid-velocity") == ["not checked", "does not meet"]
    assert "matches none" in reason(done, "liquid-velocity")
    assert set(outcomes(done, "npsh-margin")) == {"not checked"}
    assert set(outcomes(done, "pressure-gradient")) == {"not checked"}
    assert done.service_matches[0].matched.endswith("(general row: nothing matched)")


@pytest.mark.parametrize(
    ("column", "cell"),
    [("ID [mm]", "300"), ("ID [mm]", "168.3"), ("OD [mm]", "600"), ("Wall [mm]", "0.1"), ("Wall [mm]", "90")],
)
def test_dimensions_that_contradict_the_size_are_not_checked(tmp_path: Path, column: str, cell: str) -> None:
    row = "A,pump discharge,liquid,6,40,300,997,0.9,carbon steel"
    done = reviewed(tmp_path, f"{LIQUID},{column}", f"{row},{cell}")
    assert outcomes(done, "liquid-velocity") == ["not checked"]
    assert "contradict" in reason(done, "liquid-velocity")


def test_a_lined_pipe_keeps_its_explicit_bore(tmp_path: Path) -> None:
    done = reviewed(tmp_path, f"{LIQUID},ID [mm]", "A,pump discharge,liquid,6,40,100,997,0.9,carbon steel,148")
    assert done.lines["inside_diameter"].iloc[0] == pytest.approx(0.148)
    assert outcomes(done, "liquid-velocity") == ["meets"]


@pytest.mark.parametrize(
    ("phase", "density", "fraction"),
    [("liquid", "997", "0.3"), ("liquid", "1.2", "0"), ("gas", "790", "1"), ("gas", "5", "0.4")],
)
def test_a_row_that_contradicts_its_phase_is_not_checked(
    tmp_path: Path, phase: str, density: str, fraction: str
) -> None:
    row = f"A,pump discharge,{phase},6,40,100,{density},0.9,carbon steel,{fraction}"
    done = reviewed(tmp_path, f"{LIQUID},Vap. Fraction (mass)", row)
    frame = done.outcomes
    judged = frame[~frame["rule"].isin(WHATEVER_THE_PHASE)]
    assert "meets" not in set(judged["outcome"])
    # Density and viscosity themselves may say that they are none of that phase.
    by_duty = judged[~judged["rule"].isin({"liquid-density", "gas-density", "viscosity-magnitude"})]
    assert not by_duty.empty
    assert set(by_duty["outcome"]) == {"not checked"}
    assert "the list calls it" in reason(done, "liquid-velocity")


def test_a_minimum_above_the_normal_flow_is_no_minimum(tmp_path: Path) -> None:
    header = LIQUID.replace("Flow [m3/h]", "Flow min [m3/h],Flow norm [m3/h]")
    done = reviewed(tmp_path, header, "A,seawater,liquid,6,40,90,20,1025,1,carbon steel")
    assert outcomes(done, "minimum-velocity") == ["not checked"]
    assert "no minimum" in reason(done, "minimum-velocity")


def test_a_liquid_that_boils_at_its_outlet_does_not_stay_liquid(tmp_path: Path) -> None:
    header = f"{LIQUID},Oper. Press. [barg],Vap. Press. [bara],Length [m],Eq. Length [m],Elev. Change [m]"
    row = "{},pump discharge,liquid,6,40,60,790,0.5,carbon steel,{},{},20,30,{}"
    done = reviewed(
        tmp_path, header, row.format("P1", 1.0, 1.9, 10), row.format("P2", 0.0, 0.17, 18), row.format("P3", 1.0, 1.0, 1)
    )
    assert outcomes(done, "phase-change") == ["does not meet", "not checked", "meets"]


def test_a_list_without_any_flow_is_incomplete(tmp_path: Path) -> None:
    done = reviewed(tmp_path, LIQUID, "A,cooling water,liquid,6,40,0,997,0.9,carbon steel")
    assert done.recommendation == "incomplete"
    assert "no line of the list has a flow" in " ".join(done.reasons)


@pytest.mark.parametrize("unit", ["nm3/h", "mm3/h", "mt/h", "mlb/h", "ton/h", "tons/h", "Mlb/h", "nl/min"])
def test_units_are_not_read_through_a_prefix_of_the_wrong_case(tmp_path: Path, unit: str) -> None:
    """`nm3/h` is a careless Nm3/h and no cubic nanometre; a liquid has no standard flow."""
    try:
        done = reviewed(
            tmp_path, LIQUID.replace("m3/h", unit), "A,pump discharge,liquid,6,40,4000,997,0.9,carbon steel"
        )
    except InputError:
        return
    assert "meets" not in outcomes(done, "liquid-velocity")


def test_one_number_twice_in_one_case_is_told(tmp_path: Path) -> None:
    row = "A,pump discharge,liquid,6,40,100,997,0.9,carbon steel"
    done = reviewed(tmp_path, LIQUID, row, row)
    assert any("rows 2, 3" in item.scope for item in done.caution_items)
    assert outcomes(done, "doubled-line-number") == ["does not meet"] * 2
    assert done.recommendation == "revise and resubmit"


def test_methods_that_are_not_there_are_refused(tmp_path: Path) -> None:
    for method in ('fittings = "hooper-2k"', 'gas = "adiabatic"', 'two_phase = "friedel"'):
        with pytest.raises(InputError, match=r"criteria\.toml"):
            reviewed(
                tmp_path,
                LIQUID,
                "A,CWS,L,6,40,1,1,1,cs",
                criteria=f'[project]\nbased_on = "default"\n[methods]\n{method}\n',
            )


def test_a_force_for_an_unknown_rule_is_refused(tmp_path: Path) -> None:
    criteria = (
        '[project]\nbased_on = "default"\n[[service]]\nname = "x"\nmatches = ["X"]\nvelocity_maximum = "3 m/s"\n'
        'source = "project"\nbasis = "common practice"\nforce = { liquid-velocty = "shall" }\n'
    )
    with pytest.raises(InputError, match="liquid-velocity"):
        reviewed(tmp_path, LIQUID, "A,X,L,6,40,1,997,1,cs", criteria=criteria)


def test_no_output_is_written_over_an_input(tmp_path: Path) -> None:
    path = tmp_path / "hydraulics.csv"
    path.write_text(f"{LIQUID}\nA,CWS,L,6,40,100,997,0.9,carbon steel\n", encoding="utf-8")
    before = path.read_bytes()
    for arguments in (["review", str(path), "--out", str(tmp_path)], ["gate", str(path), "--json", str(path)]):
        result = CliRunner().invoke(main, arguments)
        assert result.exit_code == 2
        assert "inputs are never touched" in result.stderr
        assert path.read_bytes() == before
    assert sorted(each.name for each in tmp_path.iterdir()) == ["hydraulics.csv"]


def test_a_place_that_cannot_take_the_files_is_refused_first(tmp_path: Path) -> None:
    path = tmp_path / "list.csv"
    path.write_text(f"{LIQUID}\nA,CWS,L,6,40,100,997,0.9,carbon steel\n", encoding="utf-8")
    (tmp_path / "out" / "exceptions.pdf").mkdir(parents=True)
    result = CliRunner().invoke(main, ["review", str(path), "--out", str(tmp_path / "out")])
    assert (result.exit_code, "is a folder" in result.stderr) == (2, True)
    assert [each.name for each in (tmp_path / "out").iterdir()] == ["exceptions.pdf"]


BARE = "Line No,Service,Phase,Size (NPS),Sch,Material,Density [kg/m3],Viscosity [cP]"
BARE_ROW = "A,cooling water,liquid,6,40,carbon steel,1000,1"


@pytest.mark.parametrize("columns", ["Min. Temp [degC],Max. Temp [degC]", "Min. Press [barg],Max. Press [barg]"])
def test_a_minimum_of_another_quantity_makes_no_minimum_flow(tmp_path: Path, columns: str) -> None:
    done = reviewed(tmp_path, f"{BARE},Flow [kg/h],{columns}", f"{BARE_ROW},100000,5,60")
    assert set(outcomes(done, "minimum-velocity")) == {"not checked"}


@pytest.mark.parametrize("other", ["", "HOLD", "abc"])
def test_a_minimum_is_none_while_another_flow_of_the_line_is_open(tmp_path: Path, other: str) -> None:
    header = LIQUID.replace("Flow [m3/h]", "Flow min [m3/h],Flow norm [m3/h]")
    done = reviewed(tmp_path, header, f"A,seawater,liquid,6,40,90,{other},1025,1,carbon steel")
    assert outcomes(done, "minimum-velocity") == ["not checked"]


def test_a_rise_without_a_length_still_counts_against_the_bubble_point(tmp_path: Path) -> None:
    header = f"{BARE},Flow [kg/h],Press [bara],Vap. Press. [bara],Elev. Change [m]"
    done = reviewed(tmp_path, header, f"{BARE_ROW},100000,1.0,0.9,10")
    assert outcomes(done, "phase-change") == ["not checked"]
    done = reviewed(tmp_path, header.replace(",Elev. Change [m]", ""), f"{BARE_ROW},100000,1.0,0.9")
    assert outcomes(done, "phase-change") == ["meets"]


def test_a_relief_load_below_the_normal_flow_is_none(tmp_path: Path) -> None:
    row = "F1,flare header,gas,12,40,carbon steel,{},0.05,25,28.01,1,1.4,0.018,200,220,0,outlet,{}"
    done = reviewed(tmp_path, f"{GAS},Case", row.format(20000, "normal"), row.format(100, "relief"))
    assert set(outcomes(done, "mach-number")) == {"not checked"}
    done = reviewed(tmp_path, f"{GAS},Case", row.format(200, "normal"), row.format(9000, "relief 1"))
    assert set(outcomes(done, "mach-number")) == {"meets"}


MIXTURE = (
    "Line No,Service,Phase,Size (NPS),Sch,Material,Flow [kg/h],Press [bara],Vap. Fraction (mass),"
    "Outlet vapour fraction (mass),"
    "Liq. Density [kg/m3],Liq. Viscosity [cP],Vap. Density [kg/m3],Vap. Viscosity [cP],Surf. Tension [mN/m],"
    "Length [m],Eq. Length [m],Elev. Change [m]"
)


@pytest.mark.parametrize(
    ("fraction", "outlet", "liquid", "vapour", "word"),
    [
        ("0.2", "N/A", "800", "8", "meets"),
        ("0.2", "N/A", "40", "700", "not checked"),
        ("0", "N/A", "800", "8", "not checked"),
        ("1", "1", "800", "8", "not checked"),
        ("0", "0.1", "800", "8", "meets"),
    ],
)
def test_two_phases_must_both_be_there(
    tmp_path: Path, fraction: str, outlet: str, liquid: str, vapour: str, word: str
) -> None:
    row = f"M,wet gas,two-phase,6,40,carbon steel,12000,8,{fraction},{outlet},{liquid},0.5,{vapour},0.012,20,40,60,0"
    done = reviewed(tmp_path, MIXTURE, row)
    assert outcomes(done, "erosional-velocity") == [word]


def test_vapour_at_the_outlet_contradicts_a_liquid_and_liquid_there_a_gas(tmp_path: Path) -> None:
    row = "A,pump discharge,{},6,40,100,{},0.9,carbon steel,{}"
    for phase, density, outlet in (("liquid", 997, 0.9), ("gas", 5, 0.2)):
        done = reviewed(tmp_path, f"{LIQUID},Outlet vapour fraction (mass)", row.format(phase, density, outlet))
        assert "meets" not in set(done.outcomes.query("rule not in @WHATEVER_THE_PHASE")["outcome"])


@pytest.mark.parametrize(("bore", "word"), [("154", "meets"), ("167", "not checked"), ("100", "not checked")])
def test_a_bore_is_held_against_the_schedule_beside_it(tmp_path: Path, bore: str, word: str) -> None:
    done = reviewed(tmp_path, f"{LIQUID},ID [mm]", f"A,pump discharge,liquid,6,40,60,997,0.9,carbon steel,{bore}")
    assert outcomes(done, "liquid-velocity") == [word]


def test_a_schedule_on_hold_is_not_checked_beside_a_wall(tmp_path: Path) -> None:
    done = reviewed(tmp_path, f"{LIQUID},Wall [mm]", "A,pump discharge,liquid,6,HOLD,100,997,0.9,carbon steel,7.11")
    assert outcomes(done, "schedule-exists") == ["not checked"]
    assert "HOLD" in reason(done, "schedule-exists")


@pytest.mark.parametrize(
    ("fittings", "elevation"), [("400 x globe valve", "0"), ("abc", "0"), ("none", "30"), ("none", "-9999")]
)
def test_a_route_that_contradicts_itself_gives_no_loss(tmp_path: Path, fittings: str, elevation: str) -> None:
    header = (
        f"{LIQUID},Press [bara],Length [m],Eq. Length [m],Fittings,Elev. Change [m],Allow. dP [bar],Vap. Press. [bara]"
    )
    row = f"A,pump discharge,liquid,6,40,60,997,0.9,carbon steel,9,20,20,{fittings},{elevation},5,0.1"
    done = reviewed(tmp_path, header, row)
    wanted = "phase-change" if elevation != "0" else "pressure-budget"
    assert outcomes(done, wanted) == ["not checked"]


def test_a_gas_heavier_than_any_gas_is_none(tmp_path: Path) -> None:
    done = reviewed(tmp_path, GAS, "N1,nitrogen,gas,2,40,carbon steel,100,6,20,28.01,0.001,1.4,0.018,20,25,0,inlet")
    assert outcomes(done, "gas-velocity") == ["not checked"]
    assert "no gas" in reason(done, "gas-velocity")


def test_an_open_item_in_the_class_file_is_refused(tmp_path: Path) -> None:
    (tmp_path / "classes.csv").write_text(
        "piping_class,size_from [NPS],size_to [NPS],schedule,material,roughness [mm]\nB1,2,8,40,carbon steel,HOLD\n",
        encoding="utf-8",
    )
    (tmp_path / "list.csv").write_text("Line No,Piping Class\nA,B1\n", encoding="utf-8")
    with pytest.raises(InputError, match=r"classes\.csv, row 2, column 'roughness"):
        checker.review(tmp_path / "list.csv", classes=tmp_path / "classes.csv")


def test_a_schedule_that_is_no_word_is_not_checked_and_one_that_is_not_made_does_not_meet(tmp_path: Path) -> None:
    row = "{},pump discharge,liquid,6,{},100,997,0.9,carbon steel"
    done = reviewed(tmp_path, LIQUID, row.format("A", "abc"), row.format("B", "20"), row.format("C", "Sch. 40"))
    assert outcomes(done, "schedule-exists") == ["not checked", "does not meet", "meets"]
    assert "'abc'" in reason(done, "schedule-exists")


@pytest.mark.parametrize("flow", ["1e-6", "1e-12"])
def test_a_trickle_of_gas_does_not_choke(tmp_path: Path, flow: str) -> None:
    done = reviewed(tmp_path, GAS, f"N1,nitrogen,gas,2,40,carbon steel,{flow},6,20,28.01,1,1.4,0.018,20,25,0,inlet")
    assert done.hydraulics["pressure_outlet"].iloc[0] == pytest.approx(701325.0, rel=1e-6)
    assert outcomes(done, "gas-velocity") == ["meets"]


def test_a_gas_without_density_is_not_called_sonic(tmp_path: Path) -> None:
    done = reviewed(tmp_path, GAS, "N1,nitrogen,gas,2,40,carbon steel,100,6,20,,1,1.4,0.018,20,25,0,inlet")
    assert not any("Sonic" in item.text for item in done.caution_items)


def test_reasons_name_the_cell_that_is_wrong(tmp_path: Path) -> None:
    header = LIQUID.replace("Flow [m3/h]", "Mass Flow [kg/h],Vol Flow [m3/h]")
    done = reviewed(tmp_path, header, "A,pump discharge,liquid,6,40,abc,100,997,0.9,carbon steel")
    assert "'abc'" in reason(done, "liquid-velocity")
    assert "Mass Flow" in reason(done, "liquid-velocity")
    done = reviewed(tmp_path, LIQUID, "A,pump discharge,liquid,6,,100,997,0.9,carbon steel")
    assert "no schedule" not in reason(done, "schedule-exists").replace("gives a schedule", "")
    assert "assumed" in reason(done, "liquid-velocity")
