"""The fittings cell: counts, angles, ends, words that are not understood; Crane's n by table."""

from __future__ import annotations

import numpy as np
import pytest

from checker.hydraulics.fittings import known_fittings, read_fittings


@pytest.mark.parametrize(("text", "n", "k", "entrances", "exits"), [
    ("4 x elbow 90 LR; 1 x gate valve", 4 * 14 + 8, 0.0, 0, 0),
    ("2 x 90 elbow LR, 1 globe valve", 2 * 14 + 340, 0.0, 0, 0),
    ("3 90\u00b0 LR ells + 2 tee branch", 3 * 14 + 120, 0.0, 0, 0),
    ("90 elbow", 30, 0.0, 0, 0), ("45 elbow", 16, 0.0, 0, 0), ("90 elbow x 3", 90, 0.0, 0, 0),
    ("10 elbow 90 std", 300, 0.0, 0, 0), ("elbow 90 LR (4)", 56, 0.0, 0, 0), ("4x90deg LR elbow", 56, 0.0, 0, 0),
    ("2no. ball valves and swing check valve", 106, 0.0, 0, 0), ("Globe Valve", 340, 0.0, 0, 0),
    ("entrance; exit; 2 x elbow 45", 32, 0.0, 1, 1), ("K=2.5; gate", 8, 2.5, 0, 0), ("2 x K = 1.5", 0, 3.0, 0, 0),
    ("none", 0, 0.0, 0, 0), ("NIL", 0, 0.0, 0, 0), ("None.", 0, 0.0, 0, 0), ("tee through; tee", 80, 0.0, 0, 0),
    ("1 x foot valve; 1 x butterfly valve", 465, 0.0, 0, 0), ("2 x return bend", 100, 0.0, 0, 0),
])  # fmt: skip
def test_cells_that_can_be_read(text: str, n: float, k: float, entrances: int, exits: int) -> None:
    """n of Crane TP-410 (2009), A-28 to A-30."""
    read = read_fittings([text])
    assert read.reasons == ("",)
    assert [read.n[0], read.k[0], read.entrances[0], read.exits[0]] == [n, k, entrances, exits]


@pytest.mark.parametrize(("text", "word", "closest"), [
    ("1 x flobe valve", "flobe valve", "globe valve"), ("2 x gait valve; 1 x elbow", "gait valve", "gate valve"),
    ("3 x elbwo 90", "elbwo 90", "elbow"),
])  # fmt: skip
def test_a_word_not_understood_is_named_with_the_closest_known(text: str, word: str, closest: str) -> None:
    read = read_fittings([text])
    assert np.isnan([read.n[0], read.k[0], read.entrances[0], read.exits[0], read.entrance_coefficient[0]]).all()
    assert f"{word!r} is not understood" in read.reasons[0]
    assert closest in read.reasons[0]


@pytest.mark.parametrize("text", ["", "  ", "see isometric", "TBC", "4", "4 x", "elbows, approx", "2 x reducer 6x4"])
def test_what_is_no_list_of_fittings_is_not_read(text: str) -> None:
    read = read_fittings([text])
    assert np.isnan(read.n[0])
    assert read.reasons[0]


def test_entrance_coefficients() -> None:
    """Crane TP-410 (2009), A-30: flush 0.5, inward projecting 0.78, well rounded 0.04 (from memory)."""
    read = read_fittings(["entrance", "inward projecting entrance", "rounded entrance", "elbow"])
    assert read.entrance_coefficient.tolist() == [0.5, 0.78, 0.04, 0.0]
    assert read.entrances.tolist() == [1.0, 1.0, 1.0, 0.0]
    assert read.k.tolist() == [0.0, 0.0, 0.0, 0.0]


def test_table_is_whole() -> None:
    for fitting in known_fittings().values():
        assert fitting.source
        assert (fitting.n > 0.0) != (fitting.constant_k > 0.0)
        assert fitting.end in ("", "entrance", "exit")
        assert not read_fittings([fitting.name]).reasons[0]
