"""A project's file laid over the default, or standing alone."""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest

from checker.criteria.criteria import Criteria, Service
from checker.criteria.hints import ColumnHint
from checker.criteria.limits import force_codes, limit_origin, limit_values
from checker.criteria.load import DEFAULT as DEFAULT_FILE
from checker.criteria.load import load_criteria
from checker.criteria.services import matched

HEAD = '[project]\ntitle = "Marrowquay terminal"\ndocument = "MQ-PR-CRI-001"\nbased_on = "default"\n'
DEFAULT = load_criteria(None)
VELOCITY = ("velocity_maximum",)


def load(tmp_path: Path, text: str) -> Criteria:
    path = tmp_path / "project.toml"
    path.write_text(text, encoding="utf-8")
    return load_criteria(path)


def named(criteria: Criteria, name: str) -> Service:
    return next(service for service in criteria.services if service.name == name)


def index_of(criteria: Criteria, name: str) -> int:
    return [service.name for service in criteria.services].index(name)


def test_changes_one_key_and_says_so(tmp_path: Path) -> None:
    criteria = load(tmp_path, HEAD + '[[service]]\nname = "Cooling water"\nvelocity_maximum = "3.0 m/s"\n')
    assert criteria.differences == ("cooling water: velocity_maximum 3.7 m/s -> 3.0 m/s",)
    assert not criteria.default_only
    assert criteria.source.name == "project.toml"
    assert criteria.based_on_source == DEFAULT.source
    assert [s.name for s in criteria.services] == [s.name for s in DEFAULT.services]
    limits = named(criteria, "cooling water").limits
    assert limits["velocity_maximum"].values == (3.0,)
    assert (limits["velocity_maximum"].source, limits["velocity_maximum"].basis) == (
        "MQ-PR-CRI-001",
        "project criteria",
    )
    default = named(DEFAULT, "cooling water").limits
    assert limits["velocity_minimum"] == default["velocity_minimum"]
    assert limits["pressure_gradient_maximum"] == default["pressure_gradient_maximum"]


def test_a_projects_own_source_does_not_cover_the_defaults_figures(tmp_path: Path) -> None:
    text = '[[service]]\nname = "cooling water"\nvelocity_maximum = "3.0 m/s"\nsource = "section 4"\nbasis = "read"\n'
    limits = named(load(tmp_path, HEAD + text), "cooling water").limits
    assert limits["velocity_maximum"].source == "section 4"
    assert limits["velocity_minimum"] == named(DEFAULT, "cooling water").limits["velocity_minimum"]


def test_same_values_are_no_difference(tmp_path: Path) -> None:
    site = '[site]\natmospheric_pressure = "1013.25 mbar"\n'
    text = site + '[[service]]\nname = "cooling water"\nvelocity_maximum = "222 m/min"\n'
    assert load(tmp_path, HEAD + text).differences == ()


def test_new_services_and_stated_matches_stand_in_front(tmp_path: Path) -> None:
    text = """
[[service]]
name = "glycol"
matches = ["CWS", "GL"]
velocity_maximum = "2 m/s"
[[service]]
name = "nitrogen"
matches = ["IA"]
"""
    criteria = load(tmp_path, HEAD + text)
    assert [service.name for service in criteria.services[:2]] == ["glycol", "nitrogen"]
    assert len(criteria.services) == len(DEFAULT.services) + 1
    found = [criteria.services[index].name for index in matched(criteria, ("cws", "gl", "IA", "CWR"))]
    assert found == ["glycol", "glycol", "nitrogen", "cooling water"]
    assert "glycol: service added: velocity_maximum 2 m/s" in criteria.differences
    assert named(criteria, "nitrogen").limits == named(DEFAULT, "nitrogen").limits


def test_a_projects_general_row_replaces_the_defaults(tmp_path: Path) -> None:
    text = '[[service]]\nname = "any liquid"\nphase = "liquid"\ngeneral = true\nvelocity_maximum = "2 m/s"\n'
    criteria = load(tmp_path, HEAD + text)
    assert [s.name for s in criteria.services if s.general and s.phase == "liquid"] == ["any liquid"]
    assert "general liquid: service left out" in criteria.differences


def test_none_takes_a_limit_away(tmp_path: Path) -> None:
    criteria = load(tmp_path, HEAD + '[[service]]\nname = "cooling water"\nvelocity_minimum = "none"\n')
    assert criteria.differences == ("cooling water: velocity_minimum 0.9 m/s -> none",)
    code = np.array([index_of(criteria, "cooling water")], dtype=np.int32)
    value, state = limit_values(
        criteria=criteria, key="velocity_minimum", service=code, size=np.array([6.0]), pressure=np.array([1e6])
    )
    assert np.isnan(value[0])
    assert state[0] == 1


def test_tables_are_merged_key_by_key(tmp_path: Path) -> None:
    text = """
[site]
ambient_minimum = "-5 degC"
[methods]
two_phase = "homogeneous"
[units]
pressure = "barg"
mass_flow = "kg/h"
[columns]
"Fl. qty" = { field = "flow_mass", unit = "kg/h", case = "normal" }
[defaults]
fittings_allowance = 0.3
roughness = { "Carbon  Steel" = "0.1 mm", "lined" = "0.02 mm" }
[recommendation]
coverage_minimum = 0.8
"""
    criteria = load(tmp_path, HEAD + text)
    assert criteria.ambient_minimum == pytest.approx(268.15)
    assert criteria.atmosphere == DEFAULT.atmosphere
    assert (criteria.gas_method, criteria.two_phase_method) == ("isothermal", "homogeneous")
    assert criteria.units == {"pressure": "barg", "mass flow": "kg/h"}
    assert criteria.columns == {"Fl. qty": ColumnHint("flow_mass", "kg/h", "normal")}
    assert (criteria.fittings_allowance, criteria.coverage_minimum, criteria.gross_factor) == (0.3, 0.8, 1.25)
    assert criteria.roughness["carbon steel"] == pytest.approx(1e-4)
    assert criteria.roughness["lined"] == pytest.approx(2e-5)
    assert criteria.roughness["grp"] == pytest.approx(2e-5)
    assert criteria.differences == (
        "[site] ambient_minimum: none -> -5 degC",
        "[methods] two_phase: beggs-brill -> homogeneous",
        "[recommendation] coverage_minimum: 0.9 -> 0.8",
        "[defaults] fittings_allowance: none -> 0.3",
        "[units] mass flow: none -> kg/h",
        "[units] pressure: none -> barg",
        "[defaults] roughness of carbon steel: 5e-05 -> 0.0001",
        "[defaults] roughness of lined: none -> 2e-05",
    )


def test_gauge_bands_rest_on_the_sites_atmosphere(tmp_path: Path) -> None:
    criteria = load(tmp_path, HEAD + '[site]\natmospheric_pressure = "0.9 bar"\n')
    assert criteria.atmosphere == pytest.approx(90_000.0)
    uppers = named(criteria, "general gas").limits["momentum_flux_maximum"].uppers
    assert uppers == pytest.approx((20.9e5, 50.9e5, 80.9e5, np.inf))
    assert criteria.differences == ("[site] atmospheric_pressure: 1.01325 bar -> 0.9 bar",)


def test_a_limit_from_memory_is_at_most_should_until_confirmed(tmp_path: Path) -> None:
    """Oxygen is `shall` in the default, its figures are from memory."""
    confirmed = load(tmp_path, HEAD + '[[service]]\nname = "oxygen"\nconfirmed = "EIGA Doc 13/20"\n')
    for criteria, force in ((DEFAULT, 1), (confirmed, 2)):
        code = np.array([index_of(criteria, "oxygen"), -1], dtype=np.int32)
        codes = force_codes(
            criteria=criteria, rule_id="gas-velocity", default_force="should", service=code, keys=VELOCITY
        )
        assert codes.tolist() == [force, 1]
    assert "oxygen: confirmed none -> EIGA Doc 13/20" in confirmed.differences
    sentence = limit_origin(confirmed, "velocity_maximum", index_of(confirmed, "oxygen"), 4.0, 1.0e6)
    assert "confirmed: EIGA Doc 13/20" in sentence
    blank = load(tmp_path, HEAD + '[[service]]\nname = "oxygen"\nconfirmed = "  "\n')
    code = np.array([index_of(blank, "oxygen")], dtype=np.int32)
    codes = force_codes(criteria=blank, rule_id="gas-velocity", default_force="shall", service=code, keys=VELOCITY)
    assert codes.tolist() == [1]


def test_a_rule_whose_limit_is_not_of_the_criteria_keeps_its_force() -> None:
    code = np.array([index_of(DEFAULT, "oxygen"), -1, 0, 10**6], dtype=np.int32)
    codes = force_codes(criteria=DEFAULT, rule_id="schedule-exists", default_force="shall", service=code, keys=())
    assert codes.tolist() == [2, 2, 2, 2]
    asked = force_codes(criteria=DEFAULT, rule_id="own-rule", default_force="shall", service=code, keys=VELOCITY)
    assert asked.tolist() == [1, 2, 2, 2]


def test_force_by_service(tmp_path: Path) -> None:
    text = '[[service]]\nname = "cooling water"\nforce = { liquid-velocity = "shall" }\n'
    criteria = load(tmp_path, HEAD + text)
    service = named(criteria, "cooling water")
    assert service.force == {**named(DEFAULT, "cooling water").force, "liquid-velocity": "shall"}
    assert criteria.differences == ("cooling water: force of liquid-velocity the rule's own -> shall",)
    code = np.array([index_of(criteria, "cooling water")], dtype=np.int32)
    for rule_id, force in (("liquid-velocity", 2), ("pressure-gradient", 0)):
        codes = force_codes(criteria=criteria, rule_id=rule_id, default_force="should", service=code, keys=())
        assert codes.tolist() == [force]


def test_relief_keys(tmp_path: Path) -> None:
    text = """
[[service]]
name = "flare header"
relief_case = " maximum "
[[service]]
name = "knock-out drum vent"
matches = ["KOV"]
relief = true
[[service]]
name = "vent"
relief = true
[[service]]
name = "flare sub-header"
relief = false
"""
    criteria = load(tmp_path, HEAD + text)
    header, added = named(criteria, "flare header"), named(criteria, "knock-out drum vent")
    assert (header.relief, header.relief_case) == (True, "maximum")
    assert (added.relief, added.relief_case) == (True, "relief")
    assert not named(criteria, "flare sub-header").relief
    assert not named(criteria, "nitrogen").relief
    for sentence in (
        "flare header: relief_case relief -> maximum",
        "vent: relief no -> yes",
        "flare sub-header: relief yes -> no",
    ):
        assert sentence in criteria.differences


def test_relief_load_of_the_example_is_its_maximum_case() -> None:
    criteria = load_criteria(DEFAULT_FILE.parents[2] / "example_linelists" / "criteria.toml")
    own = [service for service in criteria.services if service.name.startswith("marrowquay")]
    assert {(service.name, service.relief_case) for service in own if service.relief} == {
        ("marrowquay relief tail pipe", "maximum"),
        ("marrowquay flare header", "maximum"),
    }
    assert all(service.relief_case == "relief" for service in own if not service.relief)


def test_a_file_that_stands_alone_knows_its_own_services_only(tmp_path: Path) -> None:
    criteria = load(tmp_path, '[[service]]\nname = "water"\nmatches = ["W"]\nvelocity_maximum = "2 m/s"\n')
    assert [service.name for service in criteria.services] == ["water"]
    assert criteria.based_on_source is None
    assert not criteria.default_only
    assert criteria.services[0].limits["velocity_maximum"].source == "project.toml"
    assert "cooling water: service left out" in criteria.differences
    assert matched(criteria, ("W", "CWS")) == [0, -1]


def test_the_blank_criteria_file_is_valid() -> None:
    criteria = load_criteria(DEFAULT_FILE.with_name("template.toml"))
    assert criteria.differences == ()
    assert criteria.services == DEFAULT.services


def test_every_example_of_the_blank_criteria_file_is_valid(tmp_path: Path) -> None:
    lines = DEFAULT_FILE.with_name("template.toml").read_text(encoding="utf-8").splitlines()
    prose = (
        "# Design",
        "# Every",
        "# place",
        "# One",
        "# is tried",
        "# the default",
        "# Other",
        "# momentum",
        "# npsh",
    )
    kept = [line if line.startswith(prose) else line.removeprefix("# ").removeprefix("#") for line in lines]
    criteria = load(tmp_path, "\n".join(kept))
    assert "cooling water: velocity_maximum 3.7 m/s -> 3.0 m/s" in criteria.differences
    assert criteria.units["pressure"] == "barg"
