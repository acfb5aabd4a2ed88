"""exceptions.html: one page that holds everything, fetches nothing and runs nothing."""

from __future__ import annotations

from functools import cache
from pathlib import Path
from typing import TYPE_CHECKING, Any

from checker import __version__
from checker.report.charts import Picture, draw_pictures
from checker.report.numbers import count, fraction, shown_unit, significant, utilisation
from checker.report.review_contract import ReviewLike
from checker.report.safe_text import visible
from checker.report.states import state_of
from checker.report.view import build_view

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
    environment.filters.update(drawn=Markup, state=state_of, shown=_in_shown_unit)
    environment.globals["style_sheet"] = lambda name: Markup((TEMPLATES / name).read_text(encoding="utf-8"))
    return environment


def _harmless(value: Any) -> Any:
    """Return a value as the page may show it: plain texts with nothing hidden in them (escaping comes after)."""
    return visible(value) if isinstance(value, str) and not hasattr(value, "__html__") else value


def _in_shown_unit(value: float, name: str) -> str:
    """Return the number of a result in the unit its column head states."""
    return significant(value * shown_unit(name, "")[1])
