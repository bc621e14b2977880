"""``combustor switch``: the same metal on other fuels."""

from __future__ import annotations

import argparse
import sys
from collections.abc import Callable

import combustor
from combustor.base.errors import EXIT_GOOD, EXIT_LIMIT, InputError, Problem
from combustor.cli.answer import Answer, check_csv, set_report, write_tables
from combustor.report.json_out import dumps
from combustor.report.switch_data import SWITCH_TABLES, switch_data, switch_document
from combustor.report.switch_tables import switch_report
from combustor.studies.switch import switch_fuel
from combustor.studies.switch_fuels import Ladder, read_ladder
from combustor.studies.switch_record import Switch

DEFAULT_SHARES = "0:100:11"


def switch(arguments: argparse.Namespace) -> Answer:
    """Rate a case on other fuels."""
    case = combustor.load_case(arguments.case)
    ladder = _ladder(arguments)
    ratio = _ratio(arguments.injector_ratio)
    check_csv(arguments, SWITCH_TABLES)
    found = switch_fuel(case, arguments.to or (), arguments.hold, ladder, ratio, _progress())
    notes = write_tables(arguments, switch_data(found))
    text = (
        f"{dumps(switch_document(found, combustor.__version__))}\n"
        if arguments.json
        else set_report(switch_report(found))
    )
    return Answer(text, _code(found, arguments.to or ()), notes)


def _code(found: Switch, asked: list[str] | tuple[()]) -> int:
    """Good where every fuel asked for by name runs as it is; a ladder alone asks for none."""
    if not asked:
        return EXIT_GOOD if found.baseline.verdict == "as it is" else EXIT_LIMIT
    good = all(one.verdict == "as it is" for one in found.fuels) and not found.refused
    return EXIT_GOOD if good else EXIT_LIMIT


def _ladder(arguments: argparse.Namespace) -> Ladder | None:
    if arguments.ladder is None:
        if arguments.shares is not None:
            raise InputError(
                Problem(
                    "shares of what?", "give --ladder FUEL as well", "--shares", arguments.shares
                )
            )
        return None
    return read_ladder(arguments.ladder, arguments.shares or DEFAULT_SHARES)


def _ratio(text: str | None) -> float | None:
    if text is None:
        return None
    try:
        return float(text)
    except ValueError:
        raise InputError(
            Problem("not a number", "above 1, up to 20", "--injector-ratio", text)
        ) from None


def _progress() -> Callable[[int, int], None] | None:
    if not sys.stderr.isatty():
        return None

    def tell(done: int, total: int) -> None:
        end = "\r\x1b[K" if done == total else ""
        sys.stderr.write(f"\r{done} of {total} ratings{end}")
        sys.stderr.flush()

    return tell
