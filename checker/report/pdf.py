"""exceptions.pdf: the same templates on A4 pages, by a renderer that may fetch nothing."""

from __future__ import annotations

from typing import Any, NoReturn

from checker.report.charts import Picture
from checker.report.html import render_html
from checker.report.quiet import quiet_printing
from checker.report.review_contract import ReviewLike

__all__ = ["PANGO_SENTENCE", "PdfUnavailableError", "render_pdf"]

PANGO_SENTENCE = (
    "exceptions.pdf was not written: the PDF library needs Pango; install it (Debian/Ubuntu: apt-get install "
    "libpango-1.0-0 libpangoft2-1.0-0 libharfbuzz-subset0; Fedora: dnf install pango; macOS: brew install pango; "
    "Windows: MSYS2, then pacman -S mingw-w64-x86_64-pango), the HTML is complete."
)


class PdfUnavailableError(Exception):
    """The PDF cannot be made on this machine; the message says what to install."""


class RefusingFetcher:
    """Stands where the renderer looks for files and addresses, and refuses every one of them."""

    # Read by newer renderers: a refused address is skipped, and the page is set without it.
    _fail_on_errors = False

    def __call__(self, url: str, *_: Any, **__: Any) -> NoReturn:
        """Refuse an address.

        Raises
        ------
        ValueError
            Always.
        """
        raise ValueError(f"the report fetches nothing: {url!r}")


def render_pdf(review: ReviewLike, *, pictures: tuple[Picture, ...] | None = None) -> bytes:
    """Return the exception report as a PDF.

    Raises
    ------
    PdfUnavailableError
        The PDF library or the system part that it needs is not there.
    """
    with quiet_printing():
        document_class = _document_class()
        page = render_html(review, pictures=pictures, paged=True)
        content = document_class(string=page, url_fetcher=RefusingFetcher(), media_type="print").write_pdf()
    if not isinstance(content, bytes):
        raise TypeError(f"the PDF library gave no bytes but {type(content).__name__}")
    return content


def _document_class() -> Any:
    try:
        from weasyprint import HTML
    except (ImportError, OSError) as error:
        raise PdfUnavailableError(PANGO_SENTENCE) from error
    return HTML
