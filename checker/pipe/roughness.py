"""Absolute roughness of new pipe by the words of a material text."""

from __future__ import annotations

import re
from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from functools import cache

import numpy as np
from numpy.typing import NDArray

from checker.model import Coded
from checker.tables.reading import read_table

__all__ = ["Material", "material_of", "materials", "roughness_by_material", "roughness_of_texts"]

FloatArray = NDArray[np.float64]


@dataclass(frozen=True)
class Material:
    """A material: its name, the one it counts as for criteria, roughness in m, its words, the source."""

    name: str
    family: str
    roughness: float
    words: tuple[tuple[str, ...], ...]
    source: str


@cache
def materials() -> tuple[Material, ...]:
    """Return every known material, from ``tables/roughness.csv``; the first whose words are met counts."""
    return tuple(
        Material(
            row["material"],
            row["family"],
            float(row["roughness_mm"]) / 1000.0,
            tuple(_words(phrase) for phrase in row["words"].split(";")),
            row["source"],
        )
        for row in read_table("roughness")
    )


def material_of(text: str) -> Material | None:
    """Return the material that a text names, such as ``A106 Gr.B``, ``SS316L`` or ``CuNi 90/10``; None if none."""
    said = _words(text)
    for material in materials():
        if any(_says(said, phrase) for phrase in material.words):
            return material
    return None


def roughness_of_texts(texts: Sequence[str], *, adopted: Mapping[str, float] | None = None) -> FloatArray:
    """Absolute roughness of each distinct material text.

    Parameters
    ----------
    texts : sequence of str
        Distinct texts of the column.
    adopted : mapping of str to float, optional
        Roughness, [m], that the criteria adopt by material in lower case; it goes before the table. A text that is
        one of its keys needs not be known otherwise.

    Returns
    -------
    ndarray
        [m]; NaN for a text that names no known material.

    References
    ----------
    .. [1] Crane, "Flow of Fluids", TP-410, 2009, A-24; NORSOK P-001; Farshad and Rieke (2006): by row of the table.
    """
    chosen = adopted or {}
    return np.array([_roughness_of(text, chosen) for text in texts], dtype=np.float64)


def roughness_by_material(*, material: Coded, adopted: Mapping[str, float]) -> FloatArray:
    """Absolute roughness of each line, [m]: that of its material's text; NaN where it is missing or not known.

    Parameters
    ----------
    material : Coded
        Material of each line.
    adopted : mapping of str to float
        As in `roughness_of_texts`.

    Returns
    -------
    ndarray
        One value a line.
    """
    by_text = roughness_of_texts(material.texts, adopted=adopted)
    return np.append(by_text, np.nan)[material.codes]


def _roughness_of(text: str, adopted: Mapping[str, float]) -> float:
    plain = " ".join(text.casefold().split())
    if plain in adopted:
        return adopted[plain]
    material = material_of(text)
    if material is None:
        return float("nan")
    return adopted.get(material.name, adopted.get(material.family, material.roughness))


def _words(text: str) -> tuple[str, ...]:
    joined = re.sub(r"\b(s?a)[\s-]+(?=\d{2,3}\b)", r"\1", text.casefold())
    return tuple(re.sub(r"[^a-z0-9*]+", " ", joined).split())


def _says(said: tuple[str, ...], phrase: tuple[str, ...]) -> bool:
    """Whether the words of a phrase follow each other in the text; a star stands for any ending."""
    span = len(phrase)
    return any(
        all(_same(word, wanted) for word, wanted in zip(said[start : start + span], phrase, strict=True))
        for start in range(len(said) - span + 1)
    )


def _same(word: str, wanted: str) -> bool:
    return word.startswith(wanted[:-1]) if wanted.endswith("*") else word == wanted
