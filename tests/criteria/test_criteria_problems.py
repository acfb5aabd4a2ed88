"""What is wrong with a criteria file is said all at once, each with file, table and key."""

from __future__ import annotations

from pathlib import Path

import pytest

from checker.criteria.load import load_criteria
from checker.errors import InputError, Problem


def problems_of(tmp_path: Path, text: str | bytes) -> list[Problem]:
    path = tmp_path / "project.toml"
    path.write_bytes(text if isinstance(text, bytes) else text.encode())
    with pytest.raises(InputError) as caught:
        load_criteria(path)
    assert caught.value.status == 2
    return list(caught.value.problems)


def test_wrong_key_unit_and_dimension_give_three_messages_at_once(tmp_path: Path) -> None:
    text = """
[[service]]
name = "cooling water"
velocity_maximun = "3 m/s"
velocity_maximum = "3 bar"
pressure_gradient_maximum = "0.45 bar / fortnight"
"""
    first, second, third = problems_of(tmp_path, text)
    place = "project.toml, [[service]] 'cooling water', "
    assert first.where == place + "velocity_maximun"
    assert "unknown key 'velocity_maximun'" in first.what
    assert "'velocity_maximum'" in first.remedy
    assert second.where == place + "velocity_maximum"
    assert second.what == "'3 bar' is a pressure, not a velocity."
    assert third.where == place + "pressure_gradient_maximum"
    assert "'bar / fortnight' is not a unit of pressure gradient" in third.what
    assert '"0.45 bar / 100 m"' in third.remedy


SERVICE = '[[service]]\nname = "a"\n'
ONE_PROBLEM = [
    ('[project]\nbased_on = "defalt"', "[project], based_on", "'defalt' is not known here"),
    ("[project]\ntitle = 7", "[project], title", "7 is not a text"),
    ('[site]\natmospheric_pressure = "1 barg"', "[site], atmospheric_pressure", "gauge pressure"),
    ('[site]\natmospheric_pressure = "5 bar"', "[site], atmospheric_pressure", "no atmospheric pressure"),
    ('[site]\nambient_minimum = "9 degC"\nambient_maximum = "8 degC"', "[site], ambient_minimum", "above the maximum"),
    ('[site]\nambient_minimum = "-400 degC"', "[site], ambient_minimum", "below absolute zero"),
    ('[methods]\ntwo_phase = "guess"', "[methods], two_phase", "'guess' is not a two-phase method of this version"),
    ('[methods]\ngas = "adiabatic"', "[methods], gas", "'adiabatic' is not a gas method of this version"),
    ('[methods]\nfittings = "hooper-2k"', "[methods], fittings", "'hooper-2k' is not a fittings method"),
    ("[methods]\ngas = 3", "[methods], gas", "3 is not a gas method of this version"),
    ('[methods]\ndownhill_recovery = "yes"', "[methods], downhill_recovery", "not true or false"),
    ("[recommendation]\ngross_factor = 0.9", "[recommendation], gross_factor", "0.9 is less than 1"),
    ("[recommendation]\ngross_factor = inf", "[recommendation], gross_factor", "not a finite number"),
    ("[recommendation]\ncoverage_minimum = nan", "[recommendation], coverage_minimum", "not a finite number"),
    ("[defaults]\nfittings_allowance = -0.1", "[defaults], fittings_allowance", "less than 0"),
    ("[defaults.roughness]\nsteel = '-1 mm'", "[defaults], roughness, steel", "not negative"),
    (
        "[defaults.roughness]\nsteel = '0.11 m'",
        "[defaults], roughness, steel",
        "'0.11 m': no pipe is rougher than 100 mm",
    ),
    ('[units]\npressure = "bar"', "[units], pressure", "gauge or absolute"),
    ('[units]\npresure = "barg"', "[units], presure", "no dimension"),
    ('[columns]\n"Q" = { field = "flow_mas" }', "[columns], Q, field", "'flow_mas' is no field"),
    ('[columns]\n"Q" = { unit = "kg/h" }', "[columns], Q", "'field' is missing"),
    ('[columns]\n"Q" = { field = "flow_mass", unit = "m" }', "[columns], Q, unit", "not a unit of mass flow"),
    ('[columns]\n"Q" = { field = "service", unit = "m" }', "[columns], Q, unit", "takes no unit"),
    ("service = 3", "[service]", "3 is not a list"),
    ("[[service]]\nvelocity_maximum = '1 m/s'", "[[service]] number 1", "'name' is missing"),
    (SERVICE + 'velocity_maximum = "3"', "[[service]] 'a', velocity_maximum", "no unit"),
    (SERVICE + "velocity_maximum = 3", "[[service]] 'a', velocity_maximum", "no limit that can be read"),
    (SERVICE + 'velocity_maximum = "-3 m/s"', "[[service]] 'a', velocity_maximum", "more than zero"),
    (SERVICE + 'velocity_maximum = "1e400 m/s"', "[[service]] 'a', velocity_maximum", "not a finite number"),
    (SERVICE + 'velocity_maximum = "nan m/s"', "[[service]] 'a', velocity_maximum", "not a number with a unit"),
    (SERVICE + "mach_maximum = inf", "[[service]] 'a', mach_maximum", "not a finite number"),
    (SERVICE + "mach_maximum = 0", "[[service]] 'a', mach_maximum", "more than zero"),
    (SERVICE + "matches = ['*']", "[[service]] 'a', matches, number 1", "every service or none"),
    (SERVICE + "general = true", "[[service]] 'a'", "names no phase"),
    (SERVICE + "relief = 'yes'", "[[service]] 'a', relief", "not true or false"),
    (SERVICE + "relief_case = ''", "[[service]] 'a', relief_case", "empty"),
    (SERVICE + "relief_case = '  '", "[[service]] 'a', relief_case", "names no case"),
    (SERVICE + "relief_case = 3", "[[service]] 'a', relief_case", "3 is not a text"),
    (SERVICE + "basis = 'rumour'", "[[service]] 'a', basis", "no basis"),
    (SERVICE + "force = { liquid-velocity = 'must' }", "[[service]] 'a', force, liquid-velocity", "'must'"),
    (SERVICE + "velocity_minimum = '2 m/s'\nvelocity_maximum = '1 m/s'", "[[service]] 'a', velocity_minimum", "above"),
    (SERVICE + '[[service]]\nname = "A "', "[[service]] 'A ', name", "used before"),
    (
        SERVICE
        + "velocity_maximum = { by = 'size', bands = [{ up_to = 'NPS 7', value = '1 m/s' }, { value = '2 m/s' }] }",
        "[[service]] 'a', velocity_maximum, bands, number 1, up_to",
        "'NPS 7' is not a nominal size",
    ),
    (
        SERVICE + "velocity_maximum = { by = 'size', bands = [{ up_to = 'NPS 6', value = '1 m/s' }] }",
        "[[service]] 'a', velocity_maximum, bands",
        "the last band ends",
    ),
    (
        SERVICE
        + "velocity_maximum = { by = 'size', bands = [{ up_to = 'NPS 6', value = '1 m/s' }, "
        + "{ up_to = 'DN 50', value = '2 m/s' }, { value = '2 m/s' }] }",
        "[[service]] 'a', velocity_maximum, bands, number 2",
        "do not ascend",
    ),
    (
        SERVICE + "mach_maximum = { by = 'pressure', bands = [{ up_to = '20 bar', value = 0.1 }, { value = 0.2 }] }",
        "[[service]] 'a', mach_maximum, bands, number 1, up_to",
        "gauge or absolute",
    ),
    (
        SERVICE + "velocity_maximum = { by = 'size', bands = [{ value = '1 m/s' }, { value = '2 m/s' }] }",
        "[[service]] 'a', velocity_maximum, bands, number 2",
        "do not ascend",
    ),
    ("[project]\ntitle = = 3", "", "at line 2, column 9"),
]


@pytest.mark.parametrize(("text", "place", "words"), ONE_PROBLEM)
def test_each_problem_names_its_place(tmp_path: Path, text: str, place: str, words: str) -> None:
    (problem,) = problems_of(tmp_path, text)
    assert problem.where.endswith(place)
    assert "project.toml" in problem.where
    assert words in problem.what
    assert problem.remedy


@pytest.mark.parametrize(
    ("text", "remedy"),
    [
        ('gas = "adiabatic"', "The gas methods of this version: 'isothermal'."),
        ('two_phase = "friedel"', "The two-phase methods of this version: 'beggs-brill' or 'homogeneous'."),
        ('fittings = "darby-3k"', "The fittings methods of this version: 'crane'."),
    ],
)
def test_an_unknown_method_is_told_the_known_ones(tmp_path: Path, text: str, remedy: str) -> None:
    (problem,) = problems_of(tmp_path, f"[methods]\n{text}")
    assert problem.remedy == remedy


def test_missing_file(tmp_path: Path) -> None:
    with pytest.raises(InputError, match="no such file"):
        load_criteria(tmp_path / "none.toml")
    with pytest.raises(InputError, match="no such file"):
        load_criteria(tmp_path)


def test_not_utf8(tmp_path: Path) -> None:
    (problem,) = problems_of(tmp_path, b"[project]\ntitle = '\xff\xfe'")
    assert "not UTF-8 text (first at line 2)" in problem.what


def test_too_large(tmp_path: Path) -> None:
    (problem,) = problems_of(tmp_path, b"#" * 2_000_001)
    assert "larger than 2 MB" in problem.what


def test_nested_too_deep(tmp_path: Path) -> None:
    (problem,) = problems_of(tmp_path, "a = " + "[" * 100_000)
    assert "nested too deep" in problem.what


def test_a_number_too_long_to_read(tmp_path: Path) -> None:
    assert problems_of(tmp_path, f"[recommendation]\ngross_factor = {'9' * 5_000}")
    assert problems_of(tmp_path, f"[recommendation]\ngross_factor = {'9' * 400}")


def test_thousands_of_problems_end_with_a_closing_sentence(tmp_path: Path) -> None:
    problems = problems_of(tmp_path, "\n".join(f"key{number} = 1" for number in range(20_000)))
    assert len(problems) == 201
    assert "more than 200 problems" in problems[-1].what


def test_byte_order_mark_is_no_matter(tmp_path: Path) -> None:
    path = tmp_path / "project.toml"
    path.write_bytes(b"\xef\xbb\xbf[project]\ntitle = 'Marrowquay terminal'\n")
    assert load_criteria(path).title == "Marrowquay terminal"
