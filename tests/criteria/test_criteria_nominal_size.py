"""Nominal sizes as people write them."""

from __future__ import annotations

import math

import fluids.piping
import pytest

from checker.criteria.nominal_size import nominal_sizes, read_nominal_size

READ = [
    ('6"', 6.0), ("6", 6.0), ("6 in", 6.0), ("NPS 6", 6.0), ("6 NPS", 6.0), ("6''", 6.0), ("6 inch", 6.0),
    ("DN150", 6.0), ("DN 150", 6.0), ("150 DN", 6.0), ("150 mm", 6.0), ("150NB", 6.0), ("dn 25", 1.0),
    ('1-1/2"', 1.5), ("1 1/2", 1.5), ("1½", 1.5), ('1½"', 1.5), ("1.5", 1.5), ("1.50", 1.5), ("½", 0.5), ("3/4", 0.75),
    ("NPS 2-1/2", 2.5), ("24.0", 24.0), ("6”", 6.0), ("80", 80.0),
]  # fmt: skip
NO_SIZE = ["", "7", "DN 151", "150", "0", "-6", "6 x 4", "6/0", "1-1/3", "NPS", "six", "6 m", "DN 6.5", "1e1", "9" * 50]


@pytest.mark.parametrize(("text", "size"), READ)
def test_read(text: str, size: float) -> None:
    assert read_nominal_size(text) == size


@pytest.mark.parametrize("text", NO_SIZE)
def test_not_a_size(text: str) -> None:
    assert math.isnan(read_nominal_size(text))


def test_pairs_agree_with_fluids() -> None:
    """`fluids.piping` carries the tables of ASME B36.10M and B36.19M; those of stainless pipe name DN beside NPS."""
    pairs = list(zip(fluids.piping.NPSS5, fluids.piping.SS5DN, strict=True))
    assert len(pairs) > 15
    assert [nominal_sizes()[nps] for nps, _ in pairs] == [dn for _, dn in pairs]
    for schedule in (fluids.piping.NPS40, fluids.piping.NPS10, fluids.piping.NPSSTD):
        assert set(schedule) <= set(nominal_sizes())


def test_ascending() -> None:
    sizes = nominal_sizes()
    assert list(sizes) == sorted(sizes)
    assert list(sizes.values()) == sorted(sizes.values())
    assert len(set(sizes.values())) == len(sizes)
    for nps, dn in sizes.items():
        if nps >= 4.0:
            assert dn == 25 * nps
