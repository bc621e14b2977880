"""``combustor comply``, ``combustor convert`` and ``combustor rules``."""

from __future__ import annotations

import argparse
from datetime import date
from pathlib import Path

import combustor
from combustor.base.errors import EXIT_GOOD, EXIT_LIMIT, InputError, Problem
from combustor.case.kinds import (
    AMBIENT_PRESSURE,
    AMBIENT_TEMPERATURE,
    HEAT_INPUT,
    HOURS_A_YEAR,
    HUMIDITY,
    OUTPUT,
)
from combustor.case.quantity import Quantity, QuantityError
from combustor.case.write import write_text
from combustor.cli.answer import Answer, check_csv, set_report, write_tables
from combustor.emissions.bases import OXYGEN_IN_AIR
from combustor.emissions.reference_day import REFERENCE_PRESSURE, AmbientAir
from combustor.emissions.rule_set import find_rules, names
from combustor.emissions.rule_template import template
from combustor.report.csv_out import check_free
from combustor.report.json_out import dumps
from combustor.studies.convert_record import Moisture, Plant, Sample

_OXYGEN = Quantity("O2", "ratio", 0.0, 0.21, '"14.2 %" or 0.142', "0 to 21 %", bare="fraction")
_AIR = Quantity("O2 in air", "ratio", 0.2, 0.22, '"20.9 %"', "20 to 22 %", bare="fraction")
_MOISTURE = Quantity("moisture", "ratio", 0.0, 0.6, '"8 %" or 0.08', "0 to 60 %", bare="fraction")


def comply(arguments: argparse.Namespace) -> Answer:
    """Hold a case against emission rules."""
    from combustor.report.comply_data import COMPLY_TABLES, comply_data
    from combustor.report.comply_tables import comply_document, comply_report

    case = combustor.load_case(arguments.case)
    check_csv(arguments, COMPLY_TABLES)
    check = combustor.comply(case, rules=arguments.rules, points=arguments.point)
    notes = write_tables(arguments, comply_data(check))
    text = (
        f"{dumps(comply_document(check, combustor.__version__))}\n"
        if arguments.json
        else set_report(comply_report(check))
    )
    return Answer(text, EXIT_LIMIT if check.inside is False else EXIT_GOOD, notes)


def convert(arguments: argparse.Namespace) -> Answer:
    """Take one emission to other bases."""
    from combustor.report.convert_tables import (
        CONVERT_TABLES,
        convert_data,
        convert_document,
        convert_report,
    )
    from combustor.studies.convert import convert as convert_emission

    check_csv(arguments, CONVERT_TABLES)
    sample, plant = _sample_and_plant(arguments)
    fuel = combustor.find_fuel(arguments.fuel)
    done = convert_emission(arguments.values, arguments.species, fuel, arguments.to, sample, plant)
    notes = write_tables(arguments, convert_data(done))
    text = (
        f"{dumps(convert_document(done, combustor.__version__))}\n"
        if arguments.json
        else set_report(convert_report(done))
    )
    return Answer(text, EXIT_GOOD, notes)


def rules(arguments: argparse.Namespace) -> Answer:
    """Show the rule sets or one of them, or write a rule file to fill in."""
    from combustor.report import rule_tables as report

    if arguments.template is not None:
        return _template(arguments)
    check_csv(arguments, report.RULE_TABLES)
    today = date.today()
    chosen = names() if arguments.name is None else (arguments.name,)
    found = tuple(find_rules(name) for name in chosen)
    notes = write_tables(arguments, report.rules_data(found, today))
    if arguments.json:
        text = f"{dumps(report.rules_document(found, combustor.__version__, today))}\n"
    elif arguments.name is None:
        text = set_report([report.rules_table(found, today)])
    else:
        text = set_report(report.rule_report(found[0], today))
    return Answer(text, EXIT_GOOD, notes)


def _template(arguments: argparse.Namespace) -> Answer:
    path = Path(arguments.template)
    if path.suffix != ".toml":
        raise InputError(
            Problem("a rule file ends in .toml", "name it so", "--template", str(path))
        )
    check_free([path], arguments.force)
    write_text(path, template(path.name, arguments.name), force=arguments.force)
    if arguments.json:
        return Answer(f"{dumps({'file': str(path), 'from': arguments.name})}\n")
    return Answer(f"wrote {path}; next: combustor comply CASE --rules {path}\n")


def _sample_and_plant(arguments: argparse.Namespace) -> tuple[Sample, Plant]:
    problems: list[Problem] = []

    def read(quantity: Quantity, option: str, text: str | None) -> float | None:
        if text is None:
            return None
        try:
            return quantity.read(_bare(text))
        except QuantityError as error:
            problems.append(Problem(error.what, error.allowed, option, text, nearest=error.nearest))
            return None

    readings = [read(_OXYGEN, "--o2", text) for text in arguments.o2 or ()]
    water = read(_MOISTURE, "--moisture", arguments.moisture)
    in_air = read(_AIR, "--air-o2", arguments.air_o2)
    heat_input = read(HEAT_INPUT, "--heat-input", arguments.heat_input)
    output = read(OUTPUT, "--output", arguments.output)
    hours = read(HOURS_A_YEAR, "--hours", arguments.hours)
    temperature = read(AMBIENT_TEMPERATURE, "--ambient-temperature", arguments.ambient_temperature)
    humidity = read(HUMIDITY, "--humidity", arguments.humidity)
    pressure = read(AMBIENT_PRESSURE, "--ambient-pressure", arguments.ambient_pressure)
    if (temperature is None) != (humidity is None) and not problems:
        problems.append(
            Problem(
                "the ISO-day correction needs temperature and humidity of the ambient air",
                "give --ambient-temperature and --humidity",
            )
        )
    if problems:
        raise InputError(problems)
    ambient = None
    if temperature is not None and humidity is not None:
        ambient = AmbientAir(temperature, pressure or REFERENCE_PRESSURE, humidity)
    moisture: Moisture = "wet" if arguments.wet else "dry"
    sample = Sample(
        oxygen=tuple(reading for reading in readings if reading is not None),
        moisture=moisture,
        oxygen_moisture="dry" if arguments.o2_dry else moisture,
        water=water,
        oxygen_in_air=OXYGEN_IN_AIR if in_air is None else in_air,
    )
    return sample, Plant(heat_input, output, hours, ambient, arguments.front_end)


def _bare(text: str) -> float | str:
    try:
        return float(text)
    except ValueError:
        return text
