"""Write every output of a review into a folder: all of them complete, or none."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from pathlib import Path

from checker.report.atomic import remove_file, write_files
from checker.report.charts import Picture, draw_pictures
from checker.report.csv_file import hydraulics_csv
from checker.report.extent import pages_worth, what_is_prepared
from checker.report.html import render_html
from checker.report.json_file import outcomes_json
from checker.report.pdf import PdfUnavailableError, render_pdf
from checker.report.review_contract import ReviewLike

__all__ = ["CSV_NAME", "HTML_NAME", "JSON_NAME", "OUTPUT_NAMES", "PDF_NAME", "WrittenFiles", "write_report"]

HTML_NAME = "exceptions.html"
PDF_NAME = "exceptions.pdf"
JSON_NAME = "outcomes.json"
CSV_NAME = "hydraulics.csv"
OUTPUT_NAMES = (HTML_NAME, PDF_NAME, JSON_NAME, CSV_NAME)


@dataclass(frozen=True, slots=True)
class WrittenFiles:
    """The files that were written, and the sentence that says why the PDF is not among them (else empty)."""

    folder: Path
    paths: tuple[Path, ...]
    pdf_problem: str = ""


def write_report(review: ReviewLike, folder: Path, *, progress: Callable[[str], None]) -> WrittenFiles:
    """Write exceptions.html, exceptions.pdf, outcomes.json and hydraulics.csv.

    Parameters
    ----------
    review : ReviewLike
        The review.
    folder : Path
        Folder for the files; made where it is not there.
    progress : callable
        Called with a short sentence before each step that takes time.

    Returns
    -------
    WrittenFiles
        Where the files are.

    Raises
    ------
    InputError
        The folder cannot be written. Nothing is written then, and nothing is when an output cannot be made.
    """
    progress("drawing the pictures")
    pictures = draw_pictures(review)
    progress(f"preparing {HTML_NAME}, {JSON_NAME} and {CSV_NAME}: {what_is_prepared(review)}")
    texts = {
        HTML_NAME: render_html(review, pictures=pictures),
        JSON_NAME: outcomes_json(review),
        CSV_NAME: hydraulics_csv(review),
    }
    contents = {name: text.encode("utf-8", errors="backslashreplace") for name, text in texts.items()}
    progress(f"preparing {PDF_NAME}: about {pages_worth(review)} pages worth")
    printed, problem = _printed(review, pictures)
    paths = write_files(folder, {**contents, **printed})
    if problem and remove_file(folder / PDF_NAME):
        problem = f"{problem} The {PDF_NAME} of an earlier run was removed, since it no longer fits the HTML."
    return WrittenFiles(folder=folder, paths=paths, pdf_problem=problem)


def _printed(review: ReviewLike, pictures: tuple[Picture, ...]) -> tuple[dict[str, bytes], str]:
    try:
        return {PDF_NAME: render_pdf(review, pictures=pictures)}, ""
    except PdfUnavailableError as error:
        return {}, str(error)
