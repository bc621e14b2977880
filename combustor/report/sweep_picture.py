"""A sweep as a picture, where the plotting library is installed (``combustor[plots]``)."""

from __future__ import annotations

import io
import os
from collections.abc import Sequence
from pathlib import Path
from typing import Any

from combustor.base.errors import InputError, Problem
from combustor.report.document import Plot
from combustor.report.sweep_fields import Limits
from combustor.report.sweep_plots import plots
from combustor.studies.sweep import Sweep

SUFFIXES = (".png", ".svg", ".pdf")
_OPTION = "--picture"
_MARKERS = "os^vDPX*<>"


def check_picture(path: Path) -> None:
    """Refuse a picture that could not be made.

    Raises
    ------
    InputError
        An ending that is none of ``SUFFIXES``, no such folder, no plotting library.
    """
    if path.suffix.lower() not in SUFFIXES:
        raise InputError(
            Problem(
                "no such kind of picture", f"end it in {', '.join(SUFFIXES)}", _OPTION, str(path)
            )
        )
    check_folder(path.parent, _OPTION)
    try:
        import matplotlib.figure  # noqa: F401 - only whether it is there
    except ImportError:
        raise InputError(
            Problem("pictures need matplotlib", "pip install 'combustor[plots]'", _OPTION)
        ) from None


def check_folder(folder: Path, option: str) -> None:
    """Refuse a folder that is not there or cannot be written to."""
    if not folder.is_dir():
        raise InputError(Problem("there is no such folder", "make it first", option, str(folder)))
    if not os.access(folder, os.W_OK):
        raise InputError(
            Problem("cannot be written to", "name another folder", option, str(folder))
        )


def write_picture(sweep: Sweep, limits: Limits, path: Path) -> None:
    """Write NOx and CO along the sweep and against each other, side by side.

    Raises
    ------
    InputError
        The file cannot be written.
    """
    data = picture(plots(sweep, limits), path.suffix.lower().removeprefix("."))
    try:
        path.write_bytes(data)
    except OSError as error:
        reason = (error.strerror or "unknown reason").lower()
        raise InputError(Problem(f"cannot be written: {reason}", file=str(path))) from None


def picture(drawn: Sequence[Plot], kind: str) -> bytes:
    """Return plots as one picture: "png", "svg" or "pdf"."""
    from matplotlib.figure import Figure

    figure = Figure(figsize=(4.6 * len(drawn), 4.2), layout="constrained")
    panels = figure.subplots(1, len(drawn), squeeze=False)[0]
    for panel, plot in zip(panels, drawn, strict=True):
        _draw(panel, plot)
    buffer = io.BytesIO()
    figure.savefig(buffer, format=kind, dpi=150)
    return buffer.getvalue()


def _plain_numbers(axis: Any) -> None:
    """Write the numbers of a logarithmic axis in full: emissions span few decades."""
    from matplotlib.ticker import FuncFormatter, LogLocator, NullFormatter

    axis.set_major_locator(LogLocator(base=10.0, subs=(1.0, 1.5, 2.0, 3.0, 5.0, 7.0), numticks=8))
    axis.set_major_formatter(FuncFormatter(lambda value, _: f"{value:.3g}"))
    axis.set_minor_formatter(NullFormatter())


def _draw(panel: Any, plot: Plot) -> None:
    for number, curve in enumerate(plot.curves):
        x = [place for place, _ in curve.points]
        y = [float("nan") if value is None else value for _, value in curve.points]
        marker = _MARKERS[number % len(_MARKERS)]
        panel.plot(x, y, marker=marker, markersize=4, linewidth=1.2, label=curve.name)
    if plot.limit_up is not None:
        panel.axhline(plot.limit_up, color="0.4", linestyle="--", linewidth=1)
    if plot.limit_across is not None:
        panel.axvline(plot.limit_across, color="0.4", linestyle="--", linewidth=1)
    if plot.log_across:
        panel.set_xscale("log")
        _plain_numbers(panel.xaxis)
    if plot.log_up:
        panel.set_yscale("log")
        _plain_numbers(panel.yaxis)
    panel.set(title=plot.title, xlabel=plot.across, ylabel=plot.up)
    panel.grid(visible=True, alpha=0.3)
    if len(plot.curves) > 1:
        panel.legend(fontsize="small")
