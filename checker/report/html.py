"""exceptions.html: one page that holds everything, fetches nothing and runs nothing."""

from __future__ import annotations

from functools import cache
from pathlib import Path
from typing import TYPE_CHECKING, Any

from checker import __version__
from checker.report.cell_record_text import read_as
from checker.report.charts import Picture, draw_pictures
from checker.report.numbers import count, fraction, shown_unit, significant, utilisation
from checker.report.review_contract import ReviewLike
from checker.report.safe_text import LONGEST_PROSE, shortened, visible
from checker.report.states import state_of
from checker.report.view import build_view
from checker.report.wording import beyond, fields_in_words, goes_by_case, listed_meaning, plural
from checker.shown import shown_value

if TYPE_CHECKING:
    from jinja2 import Environment

__all__ = ["render_html"]

TEMPLATES = Path(__file__).parent / "templates"


def render_html(review: ReviewLike, *, pictures: tuple[Picture, ...] | None = None, paged: bool = False) -> str:
    """Return the exception report as one HTML page.

    Parameters
    ----------
    review : ReviewLike
        The review.
    pictures : tuple of Picture, optional
        Its pictures, where they are drawn already.
    paged : bool
        True for the page from which the PDF is made: everything open, long tables bounded.

    Returns
    -------
    str
        The page. The same review gives the same text.
    """
    drawn = draw_pictures(review) if pictures is None else pictures
    template = _environment().get_template("report.html.j2")
    return template.render(view=build_view(review, drawn, paged=paged), version=__version__)


@cache
def _environment() -> Environment:
    from jinja2 import Environment, FileSystemLoader, StrictUndefined
    from markupsafe import Markup

    environment = Environment(
        loader=FileSystemLoader(TEMPLATES),
        autoescape=True,
        undefined=StrictUndefined,
        finalize=_harmless,
        trim_blocks=True,
        lstrip_blocks=True,
        auto_reload=False,
    )
    environment.filters.update(significant=significant, utilisation=utilisation, count=count, fraction=fraction)
    environment.filters.update(drawn=Markup, state=state_of, shown=_in_shown_unit, prose=Prose, plural=plural)
    environment.filters.update(meaning=listed_meaning, fields_in_words=fields_in_words, beyond=beyond)
    environment.filters.update(read_as=read_as, in_field_unit=lambda value, name: shown_value(name, value))
    environment.filters.update(by_case=goes_by_case)
    environment.globals["style_sheet"] = lambda name: Markup((TEMPLATES / name).read_text(encoding="utf-8"))
    return environment


class Prose(str):
    """A sentence or a calculation: not cut where the text of a cell would be."""

    __slots__ = ()


def _harmless(value: Any) -> Any:
    """Return a value as the page may show it: bounded texts, nothing hidden in them (escaping comes after)."""
    if not isinstance(value, str) or hasattr(value, "__html__"):
        return value
    return visible(shortened(value, LONGEST_PROSE) if isinstance(value, Prose) else shortened(value))


def _in_shown_unit(value: float, name: str) -> str:
    """Return the number of a result in the unit its column head states."""
    return significant(value * shown_unit(name, "")[1])
