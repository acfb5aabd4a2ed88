"""Words of the phase column: other languages, accents and pairs of phases."""

from __future__ import annotations

from pathlib import Path

import pytest
from lists import read

from checker.model import Gap

WORDS = {
    "liquid": (
        "L",
        "Liquide",
        "LÍQUIDO",
        "líquido",
        "flüssig",
        "FLU\u0308SSIG",
        "жидкость",
        "液",
        "液体",
        "Phase liquide",
    ),
    "gas": (
        "V",
        "V*",
        "V (Note 1)",
        "GAS [see note 2]",
        "gaz",
        "Vapeur",
        "gasförmig",
        "gás",
        "Gas",
        "газ",
        "气",
        "气体",
        "phase gazeuse",
        "Dampf",
    ),
    "two-phase": ("Gas/Liquid", "Liq/Vap", "L/V", "V/L", "L+V", "Liquid + Vapour", "liquide et gaz", "2-phase", "气液"),
}


@pytest.mark.parametrize(("word", "phase"), [(word, phase) for phase, words in WORDS.items() for word in words])
def test_phase_is_read_in_the_language_of_the_list(tmp_path: Path, word: str, phase: str) -> None:
    listed = read(tmp_path, f"Line No,Phase,Flow [kg/h]\nP-1,{word},10\n")
    assert listed.text("phase").text(0) == phase


@pytest.mark.parametrize(
    "word", ["solid", "gel", "L/S", "gas or liquid", "damp", "S", "flu", "液固", "V?", "~V", "GAS?", "?", "(Note 1)"]
)
def test_any_other_word_is_asked(tmp_path: Path, word: str) -> None:
    listed = read(tmp_path, f"Line No,Phase,Flow [kg/h]\nP-1,{word},10\n")
    assert Gap(int(listed.gap("phase")[0])) is Gap.REFUSED
    assert "write one of liquid, gas, two-phase" in listed.refusals["phase", 0]
