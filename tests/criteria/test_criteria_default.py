"""The bundled default criteria: their shape, their sources, and their figures against what is published."""

from __future__ import annotations

import math
import subprocess
import sys
import tomllib

import jsonschema
import numpy as np
import pytest

from checker.criteria.criteria import LIMIT_DIMENSION, Criteria, Service
from checker.criteria.load import DEFAULT, load_criteria
from checker.criteria.services import services_of_texts
from checker.criteria.structure import conforms, criteria_schema

PHASE_COLUMN = {"liquid": 0, "gas": 1, "two-phase": 2, "": 0}


@pytest.fixture(scope="module")
def criteria() -> Criteria:
    return load_criteria(None)


def named(criteria: Criteria, name: str) -> Service:
    return next(service for service in criteria.services if service.name == name)


def test_fits_the_published_schema() -> None:
    document = tomllib.loads(DEFAULT.read_text(encoding="utf-8"))
    jsonschema.Draft202012Validator.check_schema(dict(criteria_schema()))
    assert list(jsonschema.Draft202012Validator(criteria_schema()).iter_errors(document)) == []
    assert conforms(document, criteria_schema())


def test_is_long_enough_and_says_whence(criteria: Criteria) -> None:
    assert len(criteria.services) >= 35
    for service in criteria.services:
        assert service.limits, service.name
        for limit in service.limits.values():
            assert limit.source, (service.name, limit.key)
            assert limit.basis.startswith(("read", "common practice", "from memory")), (service.name, limit.key)
            assert not limit.confirmed
            assert all(math.isfinite(value) and value > 0.0 for value in limit.values)


def test_has_one_general_row_a_phase(criteria: Criteria) -> None:
    assert sorted(service.phase for service in criteria.services if service.general) == ["gas", "liquid", "two-phase"]


def test_no_exact_code_is_shadowed(criteria: Criteria) -> None:
    """Each code leads to the service that lists it."""
    for index, service in enumerate(criteria.services):
        codes = [text for text in service.matches if "*" not in text]
        found = services_of_texts(criteria, codes)[:-1, PHASE_COLUMN[service.phase]]
        assert found.tolist() == [index] * len(codes), (service.name, codes)


def test_settings(criteria: Criteria) -> None:
    assert criteria.default_only
    assert criteria.based_on_source is None
    assert criteria.differences == ()
    assert (criteria.gas_method, criteria.two_phase_method, criteria.fittings_method) == (
        "isothermal",
        "beggs-brill",
        "crane",
    )
    assert (criteria.gross_factor, criteria.coverage_minimum, criteria.stated_values_tolerance) == (1.25, 0.9, 0.10)
    assert criteria.atmosphere == pytest.approx(101_325.0, abs=1e-6)
    assert math.isnan(criteria.fittings_allowance)
    assert criteria.roughness["carbon steel"] == pytest.approx(0.05e-3)
    assert len(criteria.source.sha256) == 64


FOOT = 0.3048
PSI_PER_100_FT = 6894.757293168 / 30.48

# The figure as its source prints it, in US units, converted here; the tolerance is the printed rounding.
PUBLISHED = [
    ("general liquid", "velocity_maximum", 15 * FOOT, 0.005),  # API RP 14E 5th ed. 1991: 15 ft/s
    ("general two-phase", "velocity_minimum", 10 * FOOT, 0.05),  # API RP 14E 5th ed. 1991: 10 ft/s
    ("general two-phase", "erosional_constant", 100 * (0.45359237 / FOOT) ** 0.5, 0.05),  # API RP 14E: C = 100 US
    ("wet gas", "velocity_maximum", 50 * FOOT, 0.05),  # API RP 14E 5th ed. 1991: 50 ft/s
    ("reciprocating pump suction", "velocity_maximum", 1 * FOOT, 0.005),  # 1 ft/s, common suction practice
    ("reciprocating pump discharge", "velocity_maximum", 3 * FOOT, 0.05),  # API RP 14E above 330 rpm, from memory
    ("boiler feed water", "velocity_maximum", 15 * FOOT, 0.05),  # 8 to 15 ft/s, common practice
    ("cooling water branch", "pressure_gradient_maximum", 2 * PSI_PER_100_FT, 50.0),  # 2 psi / 100 ft, common practice
    ("cooling water header", "pressure_gradient_maximum", 0.5 * PSI_PER_100_FT, 50.0),  # 0.5 psi / 100 ft
    ("thermosiphon reboiler feed", "pressure_gradient_maximum", 0.2 * PSI_PER_100_FT, 5.0),  # 0.2 psi / 100 ft
    ("vacuum overhead", "pressure_gradient_maximum", 0.25 * PSI_PER_100_FT, 1e-6),  # 0.25 psi / 100 ft
    ("sulphuric acid, concentrated", "velocity_maximum", 2.5 * FOOT, 0.005),  # 2.5 ft/s, materials guidance
    ("lean amine", "velocity_maximum", 6 * FOOT, 0.05),  # API RP 945 (1990): 6 ft/s
    ("reciprocating compressor suction", "velocity_maximum", 40 * FOOT, 0.05),  # 20 to 40 ft/s
    ("pump suction, at bubble point", "npsh_ratio_minimum", 1.1, 0.0),  # ANSI/HI 9.6.1-2012, summary sheet
    ("pump suction, at bubble point", "npsh_margin_minimum", 1.0, 0.0),  # ANSI/HI 9.6.1-2012, summary sheet
    ("flare header", "momentum_flux_maximum", 200_000.0, 0.0),  # NORSOK P-001, flare and relief lines
]


@pytest.mark.parametrize(("name", "key", "value", "tolerance"), PUBLISHED)
def test_figure_is_the_published_one(criteria: Criteria, name: str, key: str, value: float, tolerance: float) -> None:
    (limit,) = named(criteria, name).limits[key].values
    assert limit == pytest.approx(value, abs=tolerance, rel=1e-12)


def test_oxygen_bands_keep_pressure_times_velocity_within_45_mpa_m_s(criteria: Criteria) -> None:
    """EIGA Doc 13 / CGA G-4.4 (from memory): up to 1.5 MPa 30 m/s, then p v at most 45 MPa m/s up to 10 MPa."""
    limit = named(criteria, "oxygen").limits["velocity_maximum"]
    uppers = np.array([*limit.uppers[:-1], 10.0e6])
    assert (uppers * np.array(limit.values) <= 45.0e6 * (1.0 + 1e-9)).all()


def test_bubble_point_suction_is_never_looser_than_subcooled(criteria: Criteria) -> None:
    strict, loose = (named(criteria, f"pump suction, {state}").limits for state in ("at bubble point", "subcooled"))
    for key in ("velocity_maximum", "pressure_gradient_maximum"):
        assert strict[key].uppers == loose[key].uppers
        assert all(a < b for a, b in zip(strict[key].values, loose[key].values, strict=True))


def test_every_dimension_is_one_that_the_units_know() -> None:
    from checker.units import read_quantity

    samples = {"velocity": "1 m/s", "pressure gradient": "1 bar / 100 m", "momentum flux": "1 Pa", "length": "1 m",
               "dimensionless": "1", "erosional constant": "1 SI"}  # fmt: skip
    for dimension in LIMIT_DIMENSION.values():
        assert read_quantity(samples[dimension], dimension) > 0.0


def test_loading_the_default_imports_nothing_heavy() -> None:
    code = (
        "import sys; from checker.criteria.load import load_criteria; load_criteria(None);"
        "print([name for name in ('jsonschema', 'pint', 'pandas') if name in sys.modules])"
    )
    done = subprocess.run(
        [sys.executable, "-c", code], capture_output=True, text=True, check=True, cwd=DEFAULT.parents[2]
    )
    assert done.stdout.strip() == "[]"


def test_relief_services_are_those_of_flare_and_relief_and_no_vent(criteria: Criteria) -> None:
    assert {service.name for service in criteria.services if service.relief} == {
        "relief valve tail pipe",
        "depressuring header",
        "flare sub-header",
        "flare header",
        "relief and flare, two-phase",
    }
    assert {service.relief_case for service in criteria.services} == {"relief"}
