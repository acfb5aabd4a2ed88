"""From a matplotlib figure to steady SVG: same points, same bytes; no date, no outside address, no script."""

from __future__ import annotations

import re
from collections.abc import Iterator
from contextlib import contextmanager
from html import escape
from io import StringIO
from typing import Any

from checker.report.quiet import quiet_drawing

__all__ = ["NARROW", "PALETTE", "WIDE", "new_figure", "quiet_axes", "steady_style", "themed", "to_svg"]

WIDE = 7.4
NARROW = 3.5
PALETTE = {
    "ink": "#1c262c",
    "muted": "#56636b",
    "hairline": "#ccd4d8",
    "fails": "#a3282d",
    "near": "#8a5b00",
    "meets": "#13655c",
}
_STYLE: dict[str, Any] = {
    "svg.hashsalt": "linelist-checker",
    "svg.fonttype": "none",
    "font.family": ["sans-serif"],
    "font.sans-serif": ["DejaVu Sans"],
    "font.size": 8.5,
    "text.parse_math": False,
    "axes.edgecolor": PALETTE["muted"],
    "axes.labelcolor": PALETTE["ink"],
    "text.color": PALETTE["ink"],
    "xtick.color": PALETTE["muted"],
    "ytick.color": PALETTE["muted"],
    "axes.linewidth": 0.7,
    "patch.linewidth": 0.0,
}


@contextmanager
def steady_style() -> Iterator[None]:
    """Draw with this report's style alone, whatever the reader's own matplotlib settings say."""
    with quiet_drawing():
        import matplotlib

        with matplotlib.rc_context():
            matplotlib.rcdefaults()
            settings: Any = matplotlib.rcParams
            settings.update(_STYLE)
            yield


def new_figure(*, width: float, height: float) -> Any:
    """Return an empty figure, sizes in inches, with a clear ground."""
    from matplotlib.figure import Figure

    figure = Figure(figsize=(width, height), layout="constrained")
    figure.patch.set_alpha(0.0)
    return figure


def quiet_axes(axes: Any, *, grid: str) -> None:
    """Take away all of a plot's frame that carries nothing, and rule it lightly along one axis or both."""
    axes.patch.set_alpha(0.0)
    axes.spines[["top", "right"]].set_visible(False)
    axes.grid(visible=True, axis=grid, color=PALETTE["hairline"], linewidth=0.6)
    axes.set_axisbelow(True)
    axes.tick_params(length=2.5, width=0.6)


def to_svg(figure: Any, *, name: str, label: str) -> str:
    """Return a figure as an SVG element for a page: no head, no metadata, its ids its own.

    Parameters
    ----------
    figure : Figure
        The drawing.
    name : str
        Put before every id, so that several drawings can stand in one page.
    label : str
        What the drawing shows, for readers who do not see it.
    """
    stream = StringIO()
    figure.savefig(stream, format="svg", metadata={"Date": None, "Creator": None, "Format": None, "Type": None})
    text = stream.getvalue()
    text = text[text.index("<svg") :]
    text = re.sub(r"<metadata>.*?</metadata>", "", text, flags=re.DOTALL)
    text = re.sub(r'\s+xmlns(:\w+)?="[^"]*"', "", text)
    text = text.replace("xlink:href", "href")
    text = re.sub(r'\bid="', f'id="{name}-', text)
    text = re.sub(r'href="#', f'href="#{name}-', text)
    text = text.replace("url(#", f"url(#{name}-")
    return text.replace("<svg", f'<svg role="img" aria-label="{escape(label)}"', 1).strip()


def themed(svg: str) -> str:
    """Return a drawing whose colours follow the page, light or dark."""
    for name, colour in PALETTE.items():
        svg = svg.replace(colour, f"var(--{name})")
    return svg
