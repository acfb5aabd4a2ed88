"""hydraulics.csv: one row a line case, SI, the unit in each header."""

from __future__ import annotations

import csv
from io import StringIO
from typing import Any

import numpy as np
from numpy.typing import NDArray

from checker.report.review_contract import ReviewLike
from checker.report.safe_text import harmless_cell

__all__ = ["hydraulics_csv"]

DIGITS = "%.10g"


def hydraulics_csv(review: ReviewLike) -> str:
    """Return the hydraulic results as CSV text.

    A missing number is an empty field, an infinite one ``inf``. No text of the list begins like a formula: such a text
    gets an apostrophe in front.
    """
    columns = [*review.hydraulics_columns(), ("flow_regime", "", np.array(review.flow_regimes(), dtype=object))]
    stream = StringIO()
    writer = csv.writer(stream, lineterminator="\n")
    labels = ["line_number", "case"]
    writer.writerow(labels + [harmless_cell(_header(name, unit)) for name, unit, _ in columns])
    texts = [_as_texts(values) for _, _, values in columns]
    for (line_number, case), *values in zip(review.line_case_labels(), *texts, strict=True):
        writer.writerow([harmless_cell(line_number), harmless_cell(case), *values])
    return stream.getvalue()


def _header(name: str, unit: str) -> str:
    return f"{name} [{unit}]" if unit else name


def _as_texts(values: NDArray[Any]) -> list[str]:
    array = np.asarray(values)
    if array.dtype.kind == "f":
        return ["" if value != value else DIGITS % value for value in array.tolist()]
    if array.dtype.kind in "iub":
        return [str(value) for value in array.tolist()]
    return [harmless_cell("" if value is None else str(value)) for value in array.tolist()]
