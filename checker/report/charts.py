"""The pictures of the report: utilisation of every line by rule, and velocity against its limit."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray

from checker.report.drawing import NARROW, PALETTE, WIDE, new_figure, quiet_axes, steady_style, themed, to_svg
from checker.report.numbers import count, utilisation
from checker.report.review_contract import ReviewLike, UtilisationLike, VelocityLike

__all__ = ["NEAR_LIMIT", "Picture", "draw_pictures", "utilisation_picture", "velocity_picture"]

MOST_POINTS = 2_000
NEAR_LIMIT = 0.9
AT_LIMIT = 1.0 + 1e-9
WIDEST_UTILISATION = 2.0
SIDE_MARGIN = 1.3
BINS = 40
PALEST = 0.15
# Few cells over the limit must not fade beside the many below it.
PALEST_OVER = 0.55
GOLDEN = 0.6180339887498949
PHASES = {0: "Liquid", 1: "Gas", 2: "Two-phase"}
FloatArray = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class Picture:
    """One picture: for the printed page, for a wide and a narrow screen, and its numbers as a table.

    Where there is nothing to draw, the drawings are empty and the caption says so.
    """

    title: str
    caption: str
    printed: str
    wide: str
    narrow: str
    head: tuple[str, ...]
    rows: tuple[tuple[str, ...], ...]


def draw_pictures(review: ReviewLike) -> tuple[Picture, ...]:
    """Return the pictures of a review, in the order of the report."""
    titles = {summary.rule: summary.title for summary in review.rule_summaries}
    return (
        utilisation_picture(review.utilisation_points(), titles),
        velocity_picture(review.velocity_points()),
    )


def utilisation_picture(points: UtilisationLike, titles: Mapping[str, str]) -> Picture:
    """Draw the utilisation of every judged line case, one strip a rule; over 2 000 points as shaded counts."""
    rules, values = _by_rule(points)
    names = [titles.get(rule, rule) for rule in rules]
    title = "Utilisation by rule"
    if not rules:
        return _nothing(title, "No outcome could be judged, so there is no utilisation to draw.")
    last = _last_shown(values)
    caption = _utilisation_caption(values, last)
    drawings = _both_widths("utilisation", title, lambda width: _draw_utilisation(names, values, last, width=width))
    head = ("Rule", "Judged", "Over the limit", "From 0.9 to the limit", "Highest utilisation")
    rows = tuple(_utilisation_row(name, mine) for name, mine in zip(names, values, strict=True))
    return Picture(title, caption, *drawings, head, rows)


def velocity_picture(points: VelocityLike) -> Picture:
    """Draw velocity against its upper limit, one panel a phase; over 2 000 points as shaded counts."""
    panels = _by_phase(points)
    title = "Velocity against its limit"
    if not panels:
        return _nothing(title, "No line case has both a velocity and an upper limit, so there is nothing to draw.")
    shaded = sum(velocity.size for _, velocity, _ in panels) > MOST_POINTS
    beside = "" if shaded else ", points spread a little sideways so that none hides another"
    caption = (
        "Velocity at the worst end of each line case divided by the highest velocity allowed, one panel a phase. "
        f"Across stands that limit{beside}; what lies above the scale stands at its upper edge. "
        "The full line is the limit, the broken line 0.9 of it. " + _legend(shaded=shaded)
    )
    drawings = _both_widths("velocity", title, lambda width: _draw_velocity(panels, shaded=shaded, width=width))
    head = ("Phase", "Line cases", "Over the limit", "From 0.9 to the limit", "Highest velocity / limit")
    rows = tuple(_utilisation_row(name, velocity / limit) for name, velocity, limit in panels)
    return Picture(title, caption, *drawings, head, rows)


def _nothing(title: str, sentence: str) -> Picture:
    return Picture(title, sentence, "", "", "", (), ())


def _both_widths(name: str, label: str, draw: Any) -> tuple[str, str, str]:
    with steady_style():
        wide = to_svg(draw(WIDE), name=f"{name}-wide", label=label)
        narrow = to_svg(draw(NARROW), name=f"{name}-narrow", label=label)
    return wide, themed(wide), themed(narrow)


def _legend(*, shaded: bool) -> str:
    if shaded:
        return "The darker a cell, the more line cases stand in it."
    return "■ over the limit, ▲ from 0.9 to the limit, ● below."


def _by_rule(points: UtilisationLike) -> tuple[list[str], list[FloatArray]]:
    values = np.asarray(points.utilisation, dtype=np.float64)
    index = np.asarray(points.rule)
    finite = np.isfinite(values)
    chosen = [(rule, values[finite & (index == place)]) for place, rule in enumerate(points.rules)]
    drawn = [(rule, mine) for rule, mine in chosen if mine.size]
    return [rule for rule, _ in drawn], [mine for _, mine in drawn]


def _by_phase(points: VelocityLike) -> list[tuple[str, FloatArray, FloatArray]]:
    velocity, limit = np.asarray(points.velocity, dtype=float), np.asarray(points.limit, dtype=float)
    phase = np.asarray(points.phase)
    usable = np.isfinite(velocity) & np.isfinite(limit) & (limit > 0)
    chosen = [(name, usable & (phase == code)) for code, name in PHASES.items()]
    return [(name, velocity[mine], limit[mine]) for name, mine in chosen if mine.any()]


def _last_shown(values: Sequence[FloatArray]) -> float:
    highest = max(float(mine.max()) for mine in values)
    return float(np.clip(np.ceil(highest * 10.0) / 10.0, 1.2, WIDEST_UTILISATION))


def _utilisation_caption(values: Sequence[FloatArray], last: float) -> str:
    beyond = sum(int((mine > last).sum()) for mine in values)
    shaded = sum(mine.size for mine in values) > MOST_POINTS
    tail = f" {count(beyond)} above {last:.1f} stand at the right edge." if beyond else ""
    return "Every judged line case, one strip a rule; 1.0 is the limit. " + _legend(shaded=shaded) + tail


def _utilisation_row(name: str, values: FloatArray) -> tuple[str, ...]:
    over = int((values > AT_LIMIT).sum())
    near = int(((values >= NEAR_LIMIT) & (values <= AT_LIMIT)).sum())
    return name, count(values.size), count(over), count(near), utilisation(float(values.max()))


def _draw_utilisation(names: Sequence[str], values: Sequence[FloatArray], last: float, *, width: float) -> Any:
    narrow = width < WIDE
    figure = new_figure(width=width, height=0.62 + (0.44 if narrow else 0.34) * len(names))
    axes = figure.subplots()
    quiet_axes(axes, grid="x")
    shaded = sum(mine.size for mine in values) > MOST_POINTS
    for place, mine in enumerate(values):
        (_shade_strip if shaded else _scatter_strip)(axes, place, np.minimum(mine, last), last)
    axes.axvline(1.0, color=PALETTE["fails"], linewidth=1.1)
    axes.set(xlim=(0.0, last * 1.02), ylim=(len(names) - 0.5, -0.7 if narrow else -0.5), xlabel="Utilisation")
    axes.spines["left"].set_visible(False)
    if narrow:
        axes.set_yticks([])
        for place, name in enumerate(names):
            axes.text(0.0, place - 0.34, name, va="bottom", fontsize=8)
    else:
        axes.set_yticks(range(len(names)), names)
        axes.tick_params(axis="y", length=0, labelcolor=PALETTE["ink"])
    return figure


def _scatter_strip(axes: Any, place: int, values: FloatArray, last: float) -> None:
    spread = (np.arange(values.size) * GOLDEN % 1.0 - 0.5) * 0.5
    _scatter_states(axes, values, np.asarray(place + spread + 0.08, dtype=np.float64), values)


def _scatter_states(axes: Any, across: FloatArray, up: FloatArray, used: FloatArray) -> None:
    over, below = used > AT_LIMIT, used < NEAR_LIMIT
    for chosen, marker, colour, size in (
        (below, "o", PALETTE["meets"], 9),
        (~over & ~below, "^", PALETTE["near"], 15),
        (over, "s", PALETTE["fails"], 13),
    ):
        axes.scatter(across[chosen], up[chosen], s=size, marker=marker, color=colour, alpha=0.75, clip_on=False)


def _shade_strip(axes: Any, place: int, values: FloatArray, last: float) -> None:
    numbers, edges = np.histogram(values, bins=BINS, range=(0.0, last))
    filled = np.flatnonzero(numbers)
    corners = np.stack([edges[filled], np.full(filled.size, place - 0.2)], axis=1)
    used = edges[filled] + edges[1] / 2.0
    _shade(axes, corners, (float(edges[1]), 0.5), used, numbers[filled] / numbers.max())


def _shade(axes: Any, corners: FloatArray, size: tuple[float, float], used: FloatArray, share: FloatArray) -> None:
    """Fill cells given by their lower left corners, the darker the larger their share of the fullest cell."""
    from matplotlib.collections import PolyCollection
    from matplotlib.colors import to_rgba

    outline = np.array([(0.0, 0.0), (1.0, 0.0), (1.0, 1.0), (0.0, 1.0)]) * size
    palest = np.where(used > 1.0, PALEST_OVER, PALEST)
    shades = palest + (1.0 - palest) * np.sqrt(share)
    colours = [to_rgba(_colour_of(float(each)), float(shade)) for each, shade in zip(used, shades, strict=True)]
    cells = PolyCollection(list(corners[:, np.newaxis, :] + outline), facecolors=colours, linewidths=0.0)
    axes.add_collection(cells, autolim=False)


def _colour_of(used: float) -> str:
    if used > 1.0:
        return PALETTE["fails"]
    return PALETTE["near"] if used >= NEAR_LIMIT else PALETTE["meets"]


def _draw_velocity(panels: Sequence[tuple[str, FloatArray, FloatArray]], *, shaded: bool, width: float) -> Any:
    narrow = width < WIDE
    shape = (len(panels), 1) if narrow else (1, len(panels))
    figure = new_figure(width=width, height=2.6 * len(panels) if narrow else 3.0)
    grid = figure.subplots(*shape, squeeze=False, sharey=True)
    top = _last_shown([velocity / limit for _, velocity, limit in panels])
    for axes, (name, velocity, limit) in zip(grid.flat, panels, strict=True):
        _draw_panel(axes, name, velocity / limit, limit, top, shaded=shaded)
    for axes in grid[:, 0]:
        axes.set_ylabel("Velocity / limit")
    return figure


def _draw_panel(axes: Any, name: str, used: FloatArray, limit: FloatArray, top: float, *, shaded: bool) -> None:
    quiet_axes(axes, grid="y")
    first, last = float(limit.min()) / SIDE_MARGIN, float(limit.max()) * SIDE_MARGIN
    shown = np.minimum(used, top)
    if shaded:
        _shade_cells(axes, np.log(limit), shown, (np.log(first), np.log(last)), top)
    else:
        _scatter_states(axes, _beside(np.log(limit), np.log(last / first)), shown, used)
    axes.axhline(1.0, color=PALETTE["fails"], linewidth=1.1)
    axes.axhline(NEAR_LIMIT, color=PALETTE["muted"], linewidth=0.9, linestyle=(0, (4, 3)))
    beyond = int((used > top).sum())
    note = f"; {count(beyond)} above {top:.1f}" if beyond else ""
    axes.set(xlim=(np.log(first), np.log(last)), ylim=(0.0, top * 1.02), xlabel="Limit, m/s (log scale)")
    _mark_limits(axes, limit, np.log(last / first))
    axes.set_title(name + note, loc="left", fontsize=9)


def _beside(across: FloatArray, span: float) -> FloatArray:
    """Return places a little to either side: many line cases share one limit and would hide one another."""
    spread = np.arange(across.size) * GOLDEN % 1.0 - 0.5
    return np.asarray(across + spread * span * 0.03, dtype=np.float64)


def _mark_limits(axes: Any, limit: FloatArray, span: float) -> None:
    """Mark the limits themselves on the axis, those left out that would run into the one before."""
    marks: list[float] = []
    for each in np.unique(limit).tolist():
        if not marks or np.log(each / marks[-1]) > 0.11 * span:
            marks.append(each)
    axes.set_xticks(np.log(marks), [f"{each:.3g}" for each in marks])


def _shade_cells(axes: Any, across: FloatArray, up: FloatArray, sides: tuple[float, float], top: float) -> None:
    numbers, columns, rows = np.histogram2d(across, up, bins=BINS, range=(sides, (0.0, top)))
    filled = np.nonzero(numbers)
    corners = np.stack([columns[filled[0]], rows[filled[1]]], axis=1)
    used = corners[:, 1] + rows[1] / 2.0
    size = (float(columns[1] - columns[0]), float(rows[1]))
    _shade(axes, corners, size, used, numbers[filled] / numbers.max())
