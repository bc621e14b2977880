"""``combustor sources``."""

from __future__ import annotations

import argparse

import combustor
from combustor.base.errors import EXIT_GOOD
from combustor.cli.answer import Answer, check_csv, set_report, write_tables
from combustor.report.json_out import dumps


def sources(arguments: argparse.Namespace) -> Answer:
    """Show every method, those a case stands on, or those behind one value."""
    from combustor.report import source_tables as report
    from combustor.studies.sources import all_sources, sources_of

    check_csv(arguments, report.SOURCE_TABLES)
    title = None
    if arguments.case is None:
        found = all_sources()
    else:
        case = combustor.load_case(arguments.case)
        title = case.title
        design = combustor.size(case) if case.hardware is None else None
        found = sources_of(design, combustor.rate(case))
    if arguments.of is not None:
        found = report.behind_value(arguments.of, found)
    notes = write_tables(arguments, report.sources_data(found))
    text = (
        f"{dumps(report.sources_document(found, combustor.__version__, title))}\n"
        if arguments.json
        else set_report(report.sources_report(found, title))
    )
    return Answer(text, EXIT_GOOD, notes)
