"""``combustor sweep``: what is varied, where results go, and how it ends."""

from __future__ import annotations

import argparse
import sys
from dataclasses import replace
from pathlib import Path

import combustor
from combustor.base.errors import EXIT_GOOD, EXIT_LIMIT, InputError, Problem
from combustor.case.kinds import CONCENTRATION
from combustor.case.quantity import QuantityError
from combustor.case.schema import Case
from combustor.cli.answer import Answer, check_csv, set_report, write_tables
from combustor.report.csv_out import check_free
from combustor.report.json_out import dumps
from combustor.report.progress import ProgressLine
from combustor.report.sweep_data import SWEEP_TABLES, described, sweep_data, sweep_document
from combustor.report.sweep_fields import Limits
from combustor.report.sweep_picture import check_folder, check_picture, write_picture
from combustor.report.sweep_tables import sweep_report
from combustor.report.terminal import Page
from combustor.studies.sweep import Sweep, carried_out, results_name
from combustor.studies.sweep_axis import Axis, spaced
from combustor.studies.sweep_plan import Plan, plan

INTERRUPTED = 130


def sweep(arguments: argparse.Namespace) -> Answer:
    """Rate a case over one or two varied entries."""
    case = combustor.load_case(arguments.case)
    axes = _axes(case, arguments.vary)
    laid = plan(case, axes, arguments.point, operability=not arguments.no_margins)
    limits = _limits(case, arguments)
    workers = _workers(arguments.workers)
    _check_outputs(arguments)
    file = arguments.results or results_name(laid, Path(arguments.case).stem, documents=True)
    line = ProgressLine(sys.stderr)
    try:
        found = carried_out(
            laid, file, arguments.anew, workers=workers, report=line, describe=described
        )
    except KeyboardInterrupt:
        line.clear()
        return _interrupted(laid, line, file)
    finally:
        line.clear()
    notes = write_tables(arguments, sweep_data(found, limits))
    if arguments.picture:
        write_picture(found, limits, Path(arguments.picture))
        notes += (f"wrote {arguments.picture}",)
    return Answer(_text(arguments, found, limits, file), _code(found), notes)


def _text(arguments: argparse.Namespace, found: Sweep, limits: Limits, file: str) -> str:
    if arguments.json:
        return f"{dumps(sweep_document(found, limits, file, combustor.__version__))}\n"
    page = Page.of(sys.stdout)
    if arguments.ascii:
        page = replace(page, ascii_only=True)
    return set_report(sweep_report(found, limits, file), page)


def _code(found: Sweep) -> int:
    acts = any(result.outcome.level == "act" for _, result in found.grid)
    return EXIT_LIMIT if acts else EXIT_GOOD


def _interrupted(laid: Plan, line: ProgressLine, file: str) -> Answer:
    done = 0 if line.last is None else line.last.finished
    note = (
        f"interrupted: {done} of {laid.ratings} ratings are done and kept in {file}; "
        "the same command goes on from there"
    )
    return Answer("", INTERRUPTED, (note,))


def _axes(case: Case, texts: list[str]) -> list[Axis]:
    problems: list[Problem] = []
    axes = []
    for text in texts:
        try:
            axes.append(_axis(case, text))
        except InputError as error:
            problems += error.problems
    if problems:
        raise InputError(problems)
    return axes


def _axis(case: Case, text: str) -> Axis:
    """Return the axis that ``KEY=START:STOP:COUNT`` asks for."""
    key, equals, span = text.rpartition("=")
    parts = [part.strip() for part in span.split(":")]
    if not equals or not key.strip() or len(parts) != 3 or not all(parts):
        raise InputError(
            Problem(
                "not understood",
                'write KEY=START:STOP:COUNT, e.g. "points.*.inlet_temperature=600:700:5"',
                "--vary",
                text[:80],
            )
        )
    start, stop, count = parts
    try:
        number = int(count)
    except ValueError:
        raise InputError(
            Problem("COUNT is not a whole number", "START:STOP:COUNT", "--vary", text[:80])
        ) from None
    return spaced(case, key.strip(), start, stop, number)


def _limits(case: Case, arguments: argparse.Namespace) -> Limits:
    wanted = case.targets.emissions
    nox = _limit("--nox-limit", arguments.nox_limit)
    co = _limit("--co-limit", arguments.co_limit)
    return Limits(wanted.nox if nox is None else nox, wanted.co if co is None else co)


def _limit(option: str, text: str | None) -> float | None:
    if text is None:
        return None
    try:
        value: float | str = float(text)
    except ValueError:
        value = text
    try:
        limit = CONCENTRATION.read(value)
    except QuantityError as error:
        raise InputError(
            Problem(error.what, error.allowed, option, text, nearest=error.nearest)
        ) from None
    if limit <= 0.0:
        raise InputError(Problem("a limit above zero is needed", '"25 ppm"', option, text))
    return limit


def _workers(text: str | None) -> int | None:
    if text is None:
        return None
    if not text.isdecimal() or not 1 <= int(text) <= 512:
        raise InputError(Problem("not a number of processes", "1 to 512", "--workers", text))
    return int(text)


def _check_outputs(arguments: argparse.Namespace) -> None:
    check_csv(arguments, SWEEP_TABLES)
    if arguments.csv:
        there = (p for p in (Path(arguments.csv), *Path(arguments.csv).parents) if p.exists())
        check_folder(next(there, Path()), "--csv")
    if arguments.picture:
        check_picture(Path(arguments.picture))
        check_free([Path(arguments.picture)], arguments.force)
