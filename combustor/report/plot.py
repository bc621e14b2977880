"""A plot in characters: one letter a curve, so that it reads without colour."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass

from combustor.report.document import Plot
from combustor.report.field import printable

WIDEST = 80
HEIGHT = 13
SEVERAL = "*"
LETTERS = "abcdefghijklmnopqrstuvwxyz"
_GUTTER = 9  # columns for the numbers beside the upright axis
_SHORTEST_LOG = 1.25  # span below which a logarithmic axis has nothing to say


@dataclass(frozen=True)
class _Strokes:
    upright: str
    level: str
    corner: str
    tick_left: str
    tick_below: str
    limit_up: str
    limit_across: str


_BOX = _Strokes("│", "─", "└", "┤", "┬", "┄", "┊")
_ASCII = _Strokes("|", "-", "+", "+", "+", "-", ":")


@dataclass(frozen=True)
class _Scale:
    """Values to places 0 .. cells - 1."""

    low: float
    high: float
    cells: int
    log: bool

    def place(self, value: float) -> int:
        if self.high == self.low:
            return (self.cells - 1) // 2
        share = (self._on(value) - self._on(self.low)) / (self._on(self.high) - self._on(self.low))
        return round(share * (self.cells - 1))

    def value(self, place: int) -> float:
        share = place / (self.cells - 1)
        between = self._on(self.low) + share * (self._on(self.high) - self._on(self.low))
        return 10.0**between if self.log else between

    def _on(self, value: float) -> float:
        return math.log10(value) if self.log else value


def drawn_plot(plot: Plot, width: int = WIDEST, ascii_only: bool = False) -> list[str]:
    """Return the lines of a plot, none wider than ``width`` or 80."""
    strokes = _ASCII if ascii_only else _BOX
    width = min(width, WIDEST)
    points = [
        (index % len(LETTERS), x, y)
        for index, curve in enumerate(plot.curves)
        for x, y in curve.points
        if y is not None and (x > 0.0 or not plot.log_across) and (y > 0.0 or not plot.log_up)
    ]
    if not points:
        return ["nothing to draw: no value is a result"]
    across = _scale(
        [x for _, x, _ in points], plot.limit_across, width - _GUTTER - 1, plot.log_across
    )
    up = _scale([y for _, _, y in points], plot.limit_up, HEIGHT, plot.log_up)
    canvas = [[" "] * across.cells for _ in range(HEIGHT)]
    _draw_limits(canvas, plot, across, up, strokes)
    _draw_points(canvas, points, across, up)
    lines = [_fitted(plot.up, width, ascii_only)]
    for row in range(HEIGHT):
        ticked = row % 3 == 0
        label = _number(up.value(HEIGHT - 1 - row)) if ticked else ""
        stroke = strokes.tick_left if ticked else strokes.upright
        lines.append(f"{label:>{_GUTTER - 1}} {stroke}{''.join(canvas[row])}".rstrip())
    lines += _below(plot, across, strokes, width, ascii_only)
    lines += _legend(plot, width, ascii_only)
    return lines


def _scale(values: Sequence[float], limit: float | None, cells: int, log: bool) -> _Scale:
    low, high = min(values), max(values)
    if limit is not None and (limit > 0.0 or not log):
        # a limit far away would squeeze the curves flat: then it is left out
        near = (
            low / 3.0 <= limit <= high * 3.0
            if log
            else low - (high - low) <= limit <= high + (high - low)
        )
        if near:
            low, high = min(low, limit), max(high, limit)
    return _Scale(low, high, cells, log and high > _SHORTEST_LOG * low)


def _draw_limits(
    canvas: list[list[str]], plot: Plot, across: _Scale, up: _Scale, strokes: _Strokes
) -> None:
    if plot.limit_up is not None and up.low <= plot.limit_up <= up.high:
        row = HEIGHT - 1 - up.place(plot.limit_up)
        canvas[row] = [strokes.limit_up if i % 2 == 0 else " " for i in range(across.cells)]
    if plot.limit_across is not None and across.low <= plot.limit_across <= across.high:
        column = across.place(plot.limit_across)
        for line in canvas:
            line[column] = strokes.limit_across


def _draw_points(
    canvas: list[list[str]],
    points: Sequence[tuple[int, float, float]],
    across: _Scale,
    up: _Scale,
) -> None:
    for curve, x, y in points:
        row, column = HEIGHT - 1 - up.place(y), across.place(x)
        letter = LETTERS[curve]
        there = canvas[row][column]
        taken = (there in LETTERS and there != letter) or there == SEVERAL
        canvas[row][column] = SEVERAL if taken else letter


def _below(
    plot: Plot, across: _Scale, strokes: _Strokes, width: int, ascii_only: bool
) -> list[str]:
    ticks = [0, (across.cells - 1) // 2, across.cells - 1]
    rule = "".join(strokes.tick_below if i in ticks else strokes.level for i in range(across.cells))
    numbers = [_number(across.value(place)) for place in ticks]
    line = [" "] * across.cells
    starts = [
        0,
        ticks[1] - len(numbers[1]) // 2,
        across.cells - len(numbers[2]),
    ]
    for start, text in zip(starts, numbers, strict=True):
        line[start : start + len(text)] = text
    indent = " " * (_GUTTER + 1)
    label = _fitted(plot.across, width - len(indent), ascii_only)
    return [
        " " * _GUTTER + strokes.corner + rule,
        (indent + "".join(line)).rstrip(),
        indent + label.rjust(across.cells),
    ]


def _legend(plot: Plot, width: int, ascii_only: bool) -> list[str]:
    words = [
        f"{LETTERS[i % len(LETTERS)]} {_fitted(curve.name, width - 4, ascii_only)}"
        for i, curve in enumerate(plot.curves)
    ]
    if len(plot.curves) > 1:
        words.append(f"{SEVERAL} several")
    lines: list[str] = []
    for word in words:
        if lines and len(lines[-1]) + 3 + len(word) <= width:
            lines[-1] += f"   {word}"
        else:
            lines.append(word)
    return lines


def _fitted(text: str, width: int, ascii_only: bool) -> str:
    text = printable(text)
    if ascii_only:
        text = text.encode("ascii", "replace").decode()
    return text if len(text) <= width else f"{text[: max(width - 3, 0)]}..."


def _number(value: float) -> str:
    """Return a number in at most eight characters."""
    if 1000.0 <= abs(value) < 1e7:
        return f"{value:.0f}"
    texts = (f"{value:.{figures}g}" for figures in (3, 2, 1))
    return next(text for text in texts if len(text) < _GUTTER)
