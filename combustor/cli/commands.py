"""What each command does: read, call, hand the result to the report."""

from __future__ import annotations

import argparse
from collections.abc import Callable
from pathlib import Path

import combustor
from combustor.base.errors import EXIT_GOOD, EXIT_LIMIT
from combustor.cli.answer import Answer, check_csv, set_report, write_tables
from combustor.report.csv_out import check_free
from combustor.report.json_out import dumps


def answer(arguments: argparse.Namespace) -> Answer:
    """Run the command that was parsed."""
    return _COMMANDS[arguments.command](arguments)


def new(arguments: argparse.Namespace) -> Answer:
    """Write a starter case."""
    from combustor.case.starter import starter_text
    from combustor.case.write import write_case
    from combustor.fuel import catalogue

    path = Path(arguments.file)
    check_free([path], arguments.force)
    catalogue.find(arguments.fuel)
    text = starter_text(layout=arguments.layout, fuel=arguments.fuel)
    write_case(path, text, force=arguments.force)
    if arguments.json:
        document = {"file": str(path), "layout": arguments.layout, "fuel": arguments.fuel}
        return Answer(f"{dumps(document)}\n")
    return Answer(f"wrote {path}; next: combustor rate {path}\n")


def size(arguments: argparse.Namespace) -> Answer:
    """Size the metal of a case."""
    from combustor.case.write import write_case
    from combustor.fuel.gas import Gas
    from combustor.hardware.to_case import table_of
    from combustor.report import sizing_tables as report
    from combustor.sizing.trades import Trade, trades_of

    case = combustor.load_case(arguments.case)
    check_csv(arguments, report.SIZING_TABLES)
    if arguments.output:
        check_free([Path(arguments.output)], arguments.force)
    fuel = combustor.fuel_of(case)
    design = combustor.size(case)
    notes = write_tables(arguments, report.sizing_data(design, case))
    if arguments.output:
        table = table_of(design.hardware, case.combustor)
        write_case(arguments.output, case, table, force=arguments.force)
        notes += (f"wrote {arguments.output}",)
    if case.hardware is not None:
        notes += ("the case holds metal already: it was left out and sized anew",)
    limit = not design.converged or any(f.level == "act" for f in design.findings)
    trades: tuple[Trade, ...] = ()
    if arguments.trades or limit:
        trades = trades_of(case, fuel, Gas.load(fuel.mechanism), design)
    text = (
        f"{dumps(report.design_document(design, case, combustor.__version__, trades))}\n"
        if arguments.json
        else set_report(report.sizing_report(design, case, fuel.cautions, trades))
    )
    return Answer(text, EXIT_LIMIT if limit else EXIT_GOOD, notes)


def rate(arguments: argparse.Namespace) -> Answer:
    """Rate the metal of a case at its operating points."""
    from combustor.report.rating_data import RATING_TABLES, rating_data
    from combustor.report.rating_json import ratings_document
    from combustor.report.rating_rows import level_of
    from combustor.report.rating_tables import rating_report

    case = combustor.load_case(arguments.case)
    check_csv(arguments, RATING_TABLES)
    ratings = combustor.rate(
        case, fuel=arguments.fuel, points=arguments.point, mechanism=arguments.mechanism
    )
    notes = write_tables(arguments, rating_data(ratings))
    levels = [level_of(point) for point in ratings.points]
    levels += [finding.level for finding in ratings.findings]
    text = (
        f"{dumps(ratings_document(ratings, combustor.__version__))}\n"
        if arguments.json
        else set_report(rating_report(ratings))
    )
    return Answer(text, EXIT_LIMIT if "act" in levels else EXIT_GOOD, notes)


def flame(arguments: argparse.Namespace) -> Answer:
    """Look at one flame."""
    from combustor.cli.quantities import flame_conditions
    from combustor.report import flame_tables as report

    given = flame_conditions(arguments)
    check_csv(arguments, report.FLAME_TABLES)
    fuel = combustor.find_fuel(arguments.fuel, arguments.mechanism)
    result = combustor.flame(fuel, **given)
    notes = write_tables(arguments, report.flame_data(result))
    document = report.flame_document(result)
    blocks = report.flame_report(result, fuel)
    if arguments.burning_velocity:
        from combustor.operability.burning_velocity import flame_velocity
        from combustor.report.flame_velocity import velocity_blocks, velocity_entries

        velocity = flame_velocity(
            fuel.composition, result.equivalence_ratio, result.mixture_temperature, result.pressure
        )
        document |= velocity_entries(velocity)
        blocks += velocity_blocks(velocity)
    text = f"{dumps(document)}\n" if arguments.json else set_report(blocks)
    good = result.stirred is None or result.stirred.status == "burning"
    return Answer(text, EXIT_GOOD if good else EXIT_LIMIT, notes)


def fuels(arguments: argparse.Namespace) -> Answer:
    """Show the fuel catalogue or one fuel."""
    from combustor.fuel import catalogue
    from combustor.report import fuel_tables as report

    check_csv(arguments, report.FUEL_TABLES)
    names = catalogue.names() if arguments.name is None else (arguments.name,)
    found = tuple(catalogue.find(name) for name in names)
    notes = write_tables(arguments, report.fuels_data(found))
    if arguments.json:
        text = f"{dumps(report.fuels_document(found, combustor.__version__))}\n"
    elif arguments.name is None:
        text = set_report([report.fuels_table(found)])
    else:
        text = set_report(report.fuel_report(found[0]))
    return Answer(text, EXIT_GOOD, notes)


def sweep(arguments: argparse.Namespace) -> Answer:
    """Vary entries of a case and show the trends."""
    from combustor.cli.sweep import sweep as sweep_case

    return sweep_case(arguments)


def switch(arguments: argparse.Namespace) -> Answer:
    """Rate a case on other fuels."""
    from combustor.cli.switch import switch as switch_case

    return switch_case(arguments)


def comply(arguments: argparse.Namespace) -> Answer:
    """Hold a case against emission rules."""
    from combustor.cli.permit import comply as comply_case

    return comply_case(arguments)


def convert(arguments: argparse.Namespace) -> Answer:
    """Take one emission to other bases."""
    from combustor.cli.permit import convert as convert_emission

    return convert_emission(arguments)


def rules(arguments: argparse.Namespace) -> Answer:
    """Show the rule sets, one of them, or write a rule file to fill in."""
    from combustor.cli.permit import rules as show_rules

    return show_rules(arguments)


def sources(arguments: argparse.Namespace) -> Answer:
    """Show the methods and where they were read."""
    from combustor.cli.sources import sources as show_sources

    return show_sources(arguments)


_COMMANDS: dict[str, Callable[[argparse.Namespace], Answer]] = {
    "new": new,
    "size": size,
    "rate": rate,
    "sweep": sweep,
    "switch": switch,
    "comply": comply,
    "flame": flame,
    "convert": convert,
    "fuels": fuels,
    "rules": rules,
    "sources": sources,
}
