"""Units in headers and cells, against figures of the published unit definitions.

Pressures: psi 6894.757 Pa and kgf/cm2 98 066.5 Pa (NIST SP 811, appendix B); gallon 3.785412e-3 m3, barrel
0.1589873 m3, foot3 0.02831685 m3 (same). Molar gas volumes: 22.414 m3/kmol at 0 degC and 101.325 kPa (CODATA),
23.645 m3/kmol at 15 degC and 101.325 kPa (ISO 13443), 379.48 scf/lbmol at 60 degF and 14.696 psia (GPSA).
"""

from __future__ import annotations

from pathlib import Path

import pytest
from lists import SITE_ATMOSPHERE, one_column, read

from checker.model import Gap

PRESSURES = [
    ("barg", "4.5", 450_000.0 + SITE_ATMOSPHERE),
    ("bara", "4.5", 450_000.0),
    ("bar(a)", "4.5", 450_000.0),
    ("BARG", "4.5", 450_000.0 + SITE_ATMOSPHERE),
    ("psig", "100", 689_475.73 + SITE_ATMOSPHERE),
    ("PSIA", "100", 689_475.73),
    ("kg/cm2g", "10", 980_665.0 + SITE_ATMOSPHERE),
    ("kg/cm²(g)", "10", 980_665.0 + SITE_ATMOSPHERE),
    ("kgf/cm2 a", "10", 980_665.0),
    ("ksca", "10", 980_665.0),
    ("kPag", "450", 450_000.0 + SITE_ATMOSPHERE),
    ("MPa(g)", "0.45", 450_000.0 + SITE_ATMOSPHERE),
    ("mbarg", "25", 2_500.0 + SITE_ATMOSPHERE),
    ("bar rel.", "4.5", 450_000.0 + SITE_ATMOSPHERE),
    ("bar eff", "4.5", 450_000.0 + SITE_ATMOSPHERE),
    ("bar ü", "4.5", 450_000.0 + SITE_ATMOSPHERE),
    ("bar relatifs", "4.5", 450_000.0 + SITE_ATMOSPHERE),
    ("bar manométrica", "4.5", 450_000.0 + SITE_ATMOSPHERE),
    ("bar Überdruck", "4.5", 450_000.0 + SITE_ATMOSPHERE),
    ("kg/cm² man.", "10", 980_665.0 + SITE_ATMOSPHERE),
    ("kg/cm2 M", "10", 980_665.0 + SITE_ATMOSPHERE),
    ("bar abs.", "4.5", 450_000.0),
    ("bar absolu", "4.5", 450_000.0),
    ("kgf/cm² absoluta", "10", 980_665.0),
]
FLOWS = [
    ("kg/h", "flow_mass", "3600", 1.0, 1e-12),
    ("t/h", "flow_mass", "3.6", 1.0, 1e-12),
    ("lb/h", "flow_mass", "3600", 0.45359237, 1e-9),
    ("klb/h", "flow_mass", "3.6", 0.45359237, 1e-9),
    ("m³/h", "flow_volume", "3600", 1.0, 1e-12),
    ("Am3/h", "flow_volume", "3600", 1.0, 1e-12),
    ("gpm", "flow_volume", "1000", 3.785412 / 60, 1e-6),
    ("BPD", "flow_volume", "1000", 158.9873 / 86_400, 1e-6),
    ("Nm3/h", "flow_standard", "3600", 1000 / 22.414, 2e-5),
    ("Nm³/h", "flow_standard", "3600", 1000 / 22.414, 2e-5),
    ("Sm3/h", "flow_standard", "3600", 1000 / 23.645, 3e-5),
    ("MMSCFD", "flow_standard", "1", 1e6 / 379.48 * 453.59237 / 86_400, 5e-5),
    ("kmol/h", "flow_standard", "3.6", 1.0, 1e-12),
]


@pytest.mark.parametrize(("unit", "cell", "pascal"), PRESSURES)
@pytest.mark.parametrize("place", ["header", "cell", "criteria", "units row"])
def test_pressure(tmp_path: Path, unit: str, cell: str, pascal: float, place: str) -> None:
    header = f"Press [{unit}]" if place == "header" else "Press"
    written = f"{cell} {unit}" if place == "cell" else cell
    text = one_column(header, written)
    if place == "units row":
        text = text.replace("\n", f"\n,{unit},kg/m3\n", 1)
    units = {"pressure": unit} if place == "criteria" else {}
    listed = read(tmp_path, text, units=units)
    assert listed.number("pressure")[0] == pytest.approx(pascal, rel=1e-8)
    assert listed.gap("pressure")[0] == Gap.GIVEN


@pytest.mark.parametrize(("unit", "field", "cell", "value", "tolerance"), FLOWS)
def test_flow(tmp_path: Path, unit: str, field: str, cell: str, value: float, tolerance: float) -> None:
    in_header = read(tmp_path, one_column(f"Flow ({unit})", cell))
    assert in_header.number(field)[0] == pytest.approx(value, rel=tolerance)
    in_cell = read(tmp_path, one_column("Flow", f"{cell} {unit}"))
    assert in_cell.number(field)[0] == pytest.approx(value, rel=tolerance)


@pytest.mark.parametrize("unit", ["bar", "psi", "kg/cm2", "MPa", "kPa", "Pa"])
def test_bare_pressure_asks_gauge_or_absolute(tmp_path: Path, unit: str) -> None:
    listed = read(tmp_path, one_column(f"Press [{unit}]", "4", "5 barg"))
    assert listed.gap("pressure").tolist() == [Gap.REFUSED, Gap.GIVEN]
    assert "gauge or absolute" in listed.refusals["pressure", 0]
    assert [item.address.row for item in listed.unread] == [1]
    bare_cell = read(tmp_path, one_column("Press [barg]", f"4 {unit}", "4"))
    assert bare_cell.gap("pressure").tolist() == [Gap.REFUSED, Gap.GIVEN]


def test_criteria_settle_a_bare_pressure_of_the_same_unit(tmp_path: Path) -> None:
    text = one_column("Press [bar]", "4")
    assert read(tmp_path, text, units={"pressure": "barg"}).number("pressure")[0] == 4e5 + SITE_ATMOSPHERE
    assert read(tmp_path, text, units={"pressure": "bara"}).number("pressure")[0] == 4e5
    assert read(tmp_path, text, units={"pressure": "psig"}).gap("pressure")[0] == Gap.REFUSED


def test_no_unit_is_refused(tmp_path: Path) -> None:
    listed = read(tmp_path, one_column("Temp", "60", "60 degC", "HOLD", ""))
    assert listed.gap("temperature").tolist() == [Gap.REFUSED, Gap.GIVEN, Gap.HOLD, Gap.BLANK]
    assert listed.refusals["temperature", 0].startswith("list.csv, row 1, column 'Temp': no unit")
    assert len(listed.unread) == 1
    assert listed.unread[0].address.row == 1


def test_unknown_unit_refuses_the_column_not_the_list(tmp_path: Path) -> None:
    listed = read(tmp_path, one_column("Temp [furlong]", "60", "60 K"))
    assert listed.gap("temperature").tolist() == [Gap.REFUSED, Gap.GIVEN]
    assert "furlong" in listed.refusals["temperature", 0]
    assert listed.number("density").tolist() == [998.0, 998.0]
    assert [(item.address.row, item.address.column) for item in listed.unread] == [(1, "Temp [furlong]")]


@pytest.mark.parametrize(
    ("header", "cell", "si"), [("Z", "0.92", 0.92), ("Cp/Cv", "1.4", 1.4), ("Vapour mass fraction", "0.2", 0.2)]
)
def test_dimensionless_needs_no_unit(tmp_path: Path, header: str, cell: str, si: float) -> None:
    listed = read(tmp_path, one_column(header, cell))
    name = {"Z": "compressibility", "Cp/Cv": "heat_capacity_ratio", "Vapour mass fraction": "vapour_fraction"}[header]
    assert listed.number(name)[0] == si


def test_percent(tmp_path: Path) -> None:
    assert read(tmp_path, one_column("Vapour mass fraction [%]", "20")).number("vapour_fraction")[0] == pytest.approx(
        0.2
    )
    assert read(tmp_path, one_column("Vapour fraction", "20 wt%")).number("vapour_fraction")[0] == pytest.approx(0.2)
    refused = read(tmp_path, one_column("Vapour mass fraction", "20"))
    assert refused.gap("vapour_fraction")[0] == Gap.REFUSED


def test_per_100_m(tmp_path: Path) -> None:
    for header in ("DP [bar/100m]", "dP/100m [bar]", "ΔP per 100 m (bar)"):
        listed = read(tmp_path, one_column(header, "0.45"))
        assert listed.number("pressure_gradient_stated")[0] == pytest.approx(450.0, rel=1e-14)


def test_kinematic_viscosity_takes_the_density_of_its_row(tmp_path: Path) -> None:
    text = "Line No,Visc [cSt],rho [kg/m3]\nP-1,2,850\nP-2,2,\nP-3,2 cP,\n"
    listed = read(tmp_path, text)
    assert listed.number("viscosity")[0] == pytest.approx(1.7e-3, rel=1e-14)
    assert listed.gap("viscosity").tolist() == [Gap.GIVEN, Gap.REFUSED, Gap.GIVEN]
    assert "row 3" in listed.refusals["viscosity", 1]
    assert "density" in listed.refusals["viscosity", 1]


def test_specific_gravity_is_refused_where_the_phase_is_not_liquid(tmp_path: Path) -> None:
    listed = read(tmp_path, "Line No,Phase,SG\nP-1,L,0.85\nP-2,V,0.6\nP-3,,0.85\n")
    assert listed.gap("density").tolist() == [Gap.GIVEN, Gap.REFUSED, Gap.REFUSED]
    assert listed.number("density")[0] == pytest.approx(849.16, rel=1e-4)
    assert "water or on air" in listed.refusals["density", 1]


def test_degrees_api_are_understood_but_hold_at_60_degf(tmp_path: Path) -> None:
    """30 degAPI is 141.5 / 161.5 x 999.016 = 875.3 kg/m3 (API MPMS chapter 11.1), at 60 degF and not where it flows."""
    for header, cell in (("Density [degAPI]", "30"), ("Density", "30 \u00b0API")):
        listed = read(tmp_path, f"Line No,Phase,{header},Temp [degC]\nP-1,L,{cell},20\n")
        assert listed.gap("density")[0] == Gap.REFUSED
        assert "here 875.3 kg/m3" in listed.refusals["density", 0]
        record = listed.record("density", 0)
        assert record is not None
        assert record.values == (pytest.approx(875.299, abs=1e-3),)


@pytest.mark.parametrize(
    ("header", "name", "cell", "si"),
    [
        ("Temperature(oc)", "temperature", "25", 298.15),
        ("Temperature (\u25e6C)", "temperature", "25", 298.15),
        ("Temp [\u2103]", "temperature", "25", 298.15),
        ("Flow [kg_h]", "flow_mass", "3600", 1.0),
        ("Flow [#/hr]", "flow_mass", "3600", 0.45359237),
        ("Flow (Kg/ hr)", "flow_mass", "3600", 1.0),
        ("Flow", "flow_volume", "60000 L minute^-1", 1.0),
        ("Temp", "temperature", "25 \u00b0\u0421", 298.15),
        ("Size (inches x 100)", "size", "0600", 6.0),
    ],
)
def test_unit_in_a_spelling_met(tmp_path: Path, header: str, name: str, cell: str, si: float) -> None:
    assert read(tmp_path, one_column(header, cell)).number(name)[0] == pytest.approx(si, rel=1e-12)


@pytest.mark.parametrize(
    ("header", "name", "words"),
    [
        ("Flow (MLB/H)", "flow_mass", "M is a thousand to some"),
        ("Flow (MSCFD)", "flow_mass", "write MMSCFD or scf/d"),
        ("Flow (ton/h)", "flow_mass", "907.2 kg"),
        ("Visc (mPa/s)", "viscosity", "write mPa.s"),
        ("Vap frac (mol%)", "vapour_fraction", "a mole fraction is not a mass fraction"),
        ("Press (#)", "pressure", "write psig or psia"),
    ],
)
def test_a_doubtful_unit_is_a_question_about_its_column(tmp_path: Path, header: str, name: str, words: str) -> None:
    listed = read(tmp_path, one_column(header, "5"))
    assert listed.gap(name)[0] == Gap.REFUSED
    assert words in listed.refusals[name, 0]
    assert [item.address.row for item in listed.unread] == [1]
