"""Which service of the criteria a line is."""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from checker.criteria.criteria import Criteria
from checker.criteria.load import load_criteria
from checker.criteria.services import matched, service_codes, unmatched_codes
from checker.criteria.text_folding import fits, fold_pattern, fold_text
from checker.model import Coded

DEFAULT = load_criteria(None)


def name_of(criteria: Criteria, text: str, phase: int) -> str:
    coded = Coded(np.array([0], dtype=np.int32), (text,))
    code = int(service_codes(criteria=criteria, service=coded, phase=np.array([phase], dtype=np.int8))[0])
    return criteria.services[code].name if code >= 0 else ""


LIQUID, GAS, TWO_PHASE, UNKNOWN = 0, 1, 2, -1
CASES = [
    ("CWS", LIQUID, "cooling water"),
    ("cws", LIQUID, "cooling water"),
    ("C.W.S.", LIQUID, "cooling water"),
    ("Cooling  Water Supply", LIQUID, "cooling water"),
    ("COOLING-WATER RETURN HEADER", LIQUID, "cooling water header"),
    ("SWS", LIQUID, "seawater"),
    ("Sea water to coolers", LIQUID, "seawater"),
    ("Seawater (GRP)", LIQUID, "seawater, GRP"),
    ("BFW", LIQUID, "boiler feed water"),
    ("BFW pump suction", LIQUID, "boiler feed pump suction"),
    ("Methanol pump suction", LIQUID, "pump suction, subcooled"),
    ("Ammonia pump suction", LIQUID, "pump suction, at bubble point"),
    ("pump suction", LIQUID, "pump suction, at bubble point"),
    ("Ammonia pump discharge", LIQUID, "pump discharge"),
    ("NH3", LIQUID, "ammonia liquid"),
    ("NH3", GAS, "ammonia vapour"),
    ("NH₃", GAS, "ammonia vapour"),
    ("NH3", TWO_PHASE, "general two-phase"),
    ("NH3", UNKNOWN, ""),
    ("Ammonia boil-off", GAS, "ammonia vapour"),
    ("methanol loading", LIQUID, "methanol"),
    ("LP steam", GAS, "low-pressure steam"),
    ("HPS", GAS, "high-pressure steam"),
    ("MS", GAS, "medium-pressure steam"),
    ("LP steam condensate", LIQUID, "steam condensate, pumped"),
    ("LP steam condensate", TWO_PHASE, "steam condensate, flashing"),
    ("condensate drain", LIQUID, "steam condensate, gravity"),
    ("closed drain", LIQUID, "drain"),
    ("IA", GAS, "instrument air"),
    ("N2", GAS, "nitrogen"),
    ("FL", GAS, "flare header"),
    ("HP flare sub-header", GAS, "flare sub-header"),
    ("flare KO drum pump-out", LIQUID, "general liquid"),
    ("PSV tail pipe", GAS, "relief valve tail pipe"),
    ("PSV tail pipe", TWO_PHASE, "relief and flare, two-phase"),
    ("WG", TWO_PHASE, "wet gas, two-phase"),
    ("WG", GAS, "wet gas"),
    ("FW", LIQUID, "fire water"),
    ("caustic 20%", LIQUID, "caustic up to 30 %"),
    ("caustic", LIQUID, "caustic"),
    ("P", LIQUID, "general liquid"),
    ("P", GAS, "general gas"),
    ("no such service", LIQUID, "general liquid"),
    ("no such service", GAS, "general gas"),
    ("no such service", TWO_PHASE, "general two-phase"),
    ("no such service", UNKNOWN, ""),
    ("", LIQUID, ""),
    (" - ", GAS, ""),
]


@pytest.mark.parametrize(("text", "phase", "name"), CASES)
def test_service_of(text: str, phase: int, name: str) -> None:
    assert name_of(DEFAULT, text, phase) == name


def test_missing_text_never_reads_the_last_row() -> None:
    coded = Coded(np.array([-1, 0, -1], dtype=np.int32), ("CWS",))
    codes = service_codes(criteria=DEFAULT, service=coded, phase=np.array([0, 0, -1], dtype=np.int8))
    assert codes[0] == -1
    assert codes[2] == -1
    assert DEFAULT.services[codes[1]].name == "cooling water"


def test_matched_says_which_texts_matched_nothing() -> None:
    found = matched(DEFAULT, ("CWS", "nothing of the kind", "", "NH3"))
    assert [DEFAULT.services[code].name if code >= 0 else "" for code in found] == [
        "cooling water", "", "", "ammonia liquid",
    ]  # fmt: skip


UNMATCHED = [
    ("NH3", TWO_PHASE, True),  # the services of ammonia hold for liquid and for gas only
    ("NH3", LIQUID, False),
    ("NH3", UNKNOWN, False),  # no general row without a phase
    ("no such service", GAS, True),
    ("no such service", UNKNOWN, False),
    ("flare KO drum pump-out", LIQUID, True),
    ("P", GAS, False),  # the general row's own match
    ("process liquid to store", LIQUID, False),
    ("process liquid to store", TWO_PHASE, True),
    ("CWS", LIQUID, False),
    ("", LIQUID, False),
    (" - ", GAS, False),
]


def test_unmatched_are_those_that_took_a_general_row_for_want_of_a_match() -> None:
    texts = tuple(row[0] for row in UNMATCHED)
    phase = np.array([row[1] for row in UNMATCHED], dtype=np.int8)
    service = Coded(np.arange(len(UNMATCHED), dtype=np.int32), texts)
    found = unmatched_codes(criteria=DEFAULT, service=service, phase=phase)
    assert found.tolist() == [row[2] for row in UNMATCHED]
    codes = service_codes(criteria=DEFAULT, service=service, phase=phase)
    assert all(DEFAULT.services[code].general for code in codes[found])


def test_a_missing_text_is_not_unmatched_whatever_texts_there_are() -> None:
    service = Coded(np.array([-1, 0, -1], dtype=np.int32), ("no such service",))
    phase = np.array([LIQUID, LIQUID, UNKNOWN], dtype=np.int8)
    assert unmatched_codes(criteria=DEFAULT, service=service, phase=phase).tolist() == [False, True, False]


def test_without_a_general_row_nothing_is_unmatched(tmp_path: Path) -> None:
    path = tmp_path / "project.toml"
    path.write_text("[[service]]\nname = 'first'\nmatches = ['ab*']\n")
    service = Coded(np.array([0], dtype=np.int32), ("other",))
    found = unmatched_codes(criteria=load_criteria(path), service=service, phase=np.array([LIQUID], dtype=np.int8))
    assert found.tolist() == [False]


def test_exact_texts_go_before_patterns_and_file_order_decides(tmp_path: Path) -> None:
    path = tmp_path / "project.toml"
    path.write_text(
        "[[service]]\nname = 'first'\nmatches = ['ab*']\n[[service]]\nname = 'second'\nmatches = ['abc', 'a*c']\n"
        "[[service]]\nname = 'third'\nmatches = ['abc']\n"
    )
    criteria = load_criteria(path)
    assert matched(criteria, ("abc", "abd", "axc", "c")) == [1, 0, 1, -1]
    assert name_of(criteria, "c", LIQUID) == ""


@settings(max_examples=200, deadline=None)
@given(text=st.text("ab", max_size=12), pattern=st.text("ab*", max_size=8))
def test_patterns_fit_as_file_patterns_do(text: str, pattern: str) -> None:
    """Against `fnmatch` of the standard library, whose `*` means the same."""
    import fnmatch

    assert fits(fold_text(text), fold_pattern(pattern)) == fnmatch.fnmatchcase(text, pattern)


def test_only_the_star_is_special() -> None:
    assert not fits(fold_text("ab"), fold_pattern("a[b]*c"))
    assert fits(fold_text("a?b"), fold_pattern("ab"))


def test_patterns_of_many_stars_end_soon() -> None:
    assert not fits("a" * 300, fold_pattern("*a" * 100 + "b"))


@settings(max_examples=50, deadline=None)
@given(rows=st.lists(st.tuples(st.integers(-1, 4), st.integers(-1, 2)), min_size=1, max_size=30))
def test_one_by_one_equals_all_at_once(rows: list[tuple[int, int]]) -> None:
    texts = ("CWS", "NH3", "condensate", "no such service", "flare")
    codes, phases = np.array([r[0] for r in rows], dtype=np.int32), np.array([r[1] for r in rows], dtype=np.int8)
    together = service_codes(criteria=DEFAULT, service=Coded(codes, texts), phase=phases)
    for index in range(len(rows)):
        one = slice(index, index + 1)
        alone = service_codes(criteria=DEFAULT, service=Coded(codes[one], texts), phase=phases[one])
        assert alone.tolist() == together[one].tolist()
