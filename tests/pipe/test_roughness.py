"""Roughness by the words of a material text."""

from __future__ import annotations

import numpy as np
import pytest

from checker.model import Coded
from checker.pipe.roughness import material_of, materials, roughness_by_material, roughness_of_texts


@pytest.mark.parametrize(("text", "material"), [
    ("CS", "carbon steel"), ("A106 Gr.B", "carbon steel"), ("ASTM A106-B", "carbon steel"), ("A-106", "carbon steel"),
    ("A53", "carbon steel"), ("API 5L X52", "carbon steel"), ("carbon steel", "carbon steel"),
    ("LTCS", "low-temperature carbon steel"), ("A333 Gr.6", "low-temperature carbon steel"),
    ("A335 P11", "low-alloy steel"), ("SS316L", "stainless steel"), ("316L", "stainless steel"),
    ("A312 TP316L", "stainless steel"), ("SS 304", "stainless steel"), ("Duplex", "duplex stainless steel"),
    ("A790 S31803", "duplex stainless steel"), ("CuNi 90/10", "copper-nickel"), ("90/10 Cu-Ni", "copper-nickel"),
    ("GRE", "grp"), ("GRP", "grp"), ("HDPE PE100", "polyethylene"), ("uPVC", "pvc"), ("CS galv.", "galvanised steel"),
    ("galvanised carbon steel", "galvanised steel"), ("cement lined CS", "cement lined"), ("Titanium Gr.2", "titanium"),
    ("ductile iron", "cast iron"), ("concrete", "concrete"), ("Inconel 625", "nickel alloy"),
])  # fmt: skip
def test_materials_by_their_words(text: str, material: str) -> None:
    found = material_of(text)
    assert found is not None
    assert found.name == material


@pytest.mark.parametrize("text", ["", "TBC", "unobtainium", "per class", "access", "plastics?"])
def test_what_names_no_material_has_no_roughness(text: str) -> None:
    assert material_of(text) is None
    assert np.isnan(roughness_of_texts([text])[0])


@pytest.mark.parametrize(
    ("text", "printed_mm"), [("commercial steel", 0.046), ("galvanized", 0.15), ("cast iron", 0.26), ("copper", 0.0015)]
)
def test_handbook_values(text: str, printed_mm: float) -> None:
    """Moody's table as in White, Fluid Mechanics, table 6.1 (from memory)."""
    assert roughness_of_texts([text])[0] * 1e3 == pytest.approx(printed_mm, rel=0.03)


def test_adopted_values_go_before_the_table() -> None:
    adopted = {"carbon steel": 8e-5, "stainless steel": 2e-5, "house alloy": 1e-4}
    found = roughness_of_texts(["CS", "A333", "duplex", "House  Alloy", "PVC", "nothing known"], adopted=adopted)
    assert found[:5].tolist() == [8e-5, 8e-5, 2e-5, 1e-4, 5e-6]
    assert np.isnan(found[5])


def test_by_line() -> None:
    material = Coded(np.array([1, -1, 0, 2], dtype=np.int32), ("SS316L", "CS", "?"))
    found = roughness_by_material(material=material, adopted={})
    assert found[[0, 2]] == pytest.approx([4.5e-5, 5e-5], rel=1e-14)
    assert np.isnan(found[[1, 3]]).all()


def test_table_is_whole() -> None:
    for material in materials():
        assert 0.0 < material.roughness < 5e-3
        assert material.source
        assert all(material.words)
