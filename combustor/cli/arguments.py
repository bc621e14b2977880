"""What the command line takes. Kept free of heavy imports, so that ``--help`` answers at once."""

from __future__ import annotations

import argparse
from collections.abc import Callable, Sequence
from typing import NoReturn

from combustor import __version__

_QUANTITIES = 'Quantities take a unit ("700 K", "20 bar", "5 ms", "5 %"); bare numbers are SI.'
_EXIT_CODES = (
    "exit codes: 0 good; 1 a limit broken, a point blown out or not converged, no design "
    "possible,\na verdict other than inside; 2 bad input"
)


class ArgumentError(Exception):
    """The command line cannot be understood; carries the plain lines to show."""


class _Parser(argparse.ArgumentParser):
    """A parser whose errors are raised as plain lines instead of printed with the usage."""

    def error(self, message: str) -> NoReturn:
        raise ArgumentError(f"{self.prog}: {message}\n{self.prog} --help shows what it takes")


def parse(argv: Sequence[str]) -> argparse.Namespace:
    """Return the parsed command line.

    Raises
    ------
    ArgumentError
        With the lines to show on stderr.
    SystemExit
        After ``--help`` or ``--version`` has been printed.
    """
    parser, commands = _parsers()
    command = next((word for word in argv if not word.startswith("-")), None)
    choices = ", ".join(commands)
    if not argv:
        raise ArgumentError(f"combustor: no command given\ncommands: {choices}")
    if command is not None and command not in commands:
        raise ArgumentError(
            f"combustor: no command {command!r}{_nearest(command, list(commands))}\n"
            f"commands: {choices}"
        )
    arguments, unknown = parser.parse_known_args(argv)
    if unknown:
        chosen = commands[arguments.command]
        options = [option for action in chosen._actions for option in action.option_strings]
        raise ArgumentError(
            f"{chosen.prog}: {unknown[0]!r} is not understood{_nearest(unknown[0], options)}\n"
            f"{chosen.prog} --help shows what it takes"
        )
    return arguments


def _parsers() -> tuple[_Parser, dict[str, _Parser]]:
    parser = _Parser(
        prog="combustor",
        description="Size and rate gas-turbine flame tubes: air split, fire, walls, emissions.",
        epilog=f"{_EXIT_CODES}\n\nexample:\n  combustor new my.toml && combustor rate my.toml",
        formatter_class=argparse.RawDescriptionHelpFormatter,
        allow_abbrev=False,
    )
    parser.add_argument("--version", action="version", version=f"combustor {__version__}")
    group = parser.add_subparsers(dest="command", metavar="COMMAND", required=True)
    commands: dict[str, _Parser] = {}
    for name, summary, examples, fill in _COMMANDS:
        commands[name] = command = group.add_parser(
            name,
            help=summary,
            description=f"{summary[0].upper()}{summary[1:]}.",
            epilog="example:\n" + "\n".join(f"  {line}" for line in examples),
            formatter_class=argparse.RawDescriptionHelpFormatter,
            allow_abbrev=False,
        )
        fill(command)
        command.add_argument(
            "--json", action="store_true", help="one JSON document on stdout instead of tables"
        )
    return parser, commands


def _tables(command: _Parser) -> None:
    command.add_argument("--csv", metavar="DIR", help="also write each table to a file in DIR")
    _force(command)


def _force(command: _Parser) -> None:
    command.add_argument("--force", action="store_true", help="replace files that are there")


def _new(command: _Parser) -> None:
    command.add_argument("file", metavar="FILE", help="case file to write")
    command.add_argument("--layout", metavar="L", default="can", help="layout (default can)")
    command.add_argument(
        "--fuel", metavar="F", default="natural-gas", help="fuel (default natural-gas)"
    )
    _force(command)


def _size(command: _Parser) -> None:
    command.add_argument("case", metavar="CASE", help="case file")
    command.add_argument("-o", metavar="FILE", dest="output", help="write the completed case")
    command.add_argument(
        "--trades",
        action="store_true",
        help="relax each target by a step and size again; done unasked where a limit is broken",
    )
    _tables(command)


def _rate(command: _Parser) -> None:
    command.add_argument("case", metavar="CASE", help="case file")
    command.add_argument(
        "--point", metavar="NAME", action="append", help="rate this point only; may be repeated"
    )
    command.add_argument("--fuel", metavar="NAME", help="burn this fuel instead of the case's own")
    command.add_argument("--mechanism", metavar="FILE", help="a Cantera file of your own")
    _tables(command)


def _sources(command: _Parser) -> None:
    command.add_argument(
        "case", metavar="CASE", nargs="?", help="case file; without it, every method there is"
    )
    command.add_argument(
        "--of",
        metavar="QUANTITY",
        help="only what stands behind this value: its key in JSON and CSV (nox_ppmvd_15, "
        "split.penetration_mm), or words of what a method gives",
    )
    _tables(command)


def _sweep(command: _Parser) -> None:
    command.description = (
        f"{command.description}\nKEY is a dotted path into the case: targets.pressure_loss, "
        "points.NAME.KEY, points.*.KEY, hardware.openings.NAME.diameter. START and STOP are SI, "
        "or both carry a unit. The same command goes on where it was stopped."
    )
    command.add_argument("case", metavar="CASE", help="case file")
    command.add_argument(
        "--vary",
        metavar="KEY=START:STOP:COUNT",
        action="append",
        required=True,
        help="entry to vary and its values; may be given twice",
    )
    command.add_argument(
        "--point", metavar="NAME", action="append", help="this point only; may be repeated"
    )
    command.add_argument(
        "--results",
        metavar="FILE",
        help="file that ratings are appended to as they finish and taken up from (default: "
        "named after the case and this sweep, in the current folder)",
    )
    command.add_argument(
        "--anew", action="store_true", help="begin the results file anew, whatever it holds"
    )
    command.add_argument(
        "--no-margins",
        action="store_true",
        help="leave out blow-out and the rest of operability: about half the time",
    )
    command.add_argument("--workers", metavar="N", help="processes (default: one for each core)")
    command.add_argument(
        "--nox-limit", metavar="X", help='dry, 15 %% O2, e.g. "25 ppm" (default: the case\'s)'
    )
    command.add_argument("--co-limit", metavar="X", help="as --nox-limit, for CO")
    command.add_argument(
        "--picture", metavar="FILE", help="also draw a .png, .svg or .pdf (needs matplotlib)"
    )
    command.add_argument("--ascii", action="store_true", help="plain ASCII tables and plots")
    _tables(command)


def _switch(command: _Parser) -> None:
    command.add_argument("case", metavar="CASE", help="case file")
    command.add_argument(
        "--to", metavar="FUEL", action="append", help="another fuel or blend; may be repeated"
    )
    command.add_argument(
        "--hold",
        metavar="WHAT",
        choices=("exit-temperature", "heat", "valve"),
        default="exit-temperature",
        help="kept at each point: exit-temperature (default), heat, or valve (same injector and "
        "pressure ahead of it)",
    )
    command.add_argument(
        "--ladder", metavar="FUEL", help="add this fuel to the case's own by steps"
    )
    command.add_argument(
        "--shares", metavar="START:STOP:COUNT", help="volume percent of it (default 0:100:11)"
    )
    command.add_argument(
        "--injector-ratio",
        metavar="X",
        help="pressure ratio of the gas injector at the design point on the present fuel "
        "(default: fuel.supply_pressure over the inlet, else 1.3)",
    )
    _tables(command)


def _flame(command: _Parser) -> None:
    command.description = f"{command.description}\n{_QUANTITIES}"
    command.add_argument("fuel", metavar="FUEL", help="catalogue name, or a blend by volume")
    command.add_argument("--phi", metavar="X", required=True, help="equivalence ratio")
    command.add_argument(
        "--temperature", metavar="T", required=True, help="of the mixture, or of the air"
    )
    command.add_argument("--pressure", metavar="P", required=True, help="absolute")
    command.add_argument("--time", metavar="T", help="residence time of a stirred reactor")
    command.add_argument(
        "--fuel-temperature", metavar="T", help="of the fuel; else mixed at --temperature"
    )
    command.add_argument(
        "--humidity", metavar="H", help="kg water per kg dry air (default the ISO day, 0.00634)"
    )
    command.add_argument("--mechanism", metavar="FILE", help="a Cantera file of your own")
    command.add_argument(
        "--burning-velocity",
        action="store_true",
        help="also solve a flat flame (GRI-Mech 3.0, dry air; several seconds)",
    )
    _tables(command)


def _fuels(command: _Parser) -> None:
    command.add_argument("name", metavar="NAME", nargs="?", help="show this fuel in full")
    _tables(command)


def _comply(command: _Parser) -> None:
    command.add_argument("case", metavar="CASE", help="case file; [rules] holds the facts")
    command.add_argument(
        "--rules",
        metavar="NAME",
        action="append",
        help="rule set, or path of your own rule file; may be repeated (default: those of the "
        "case, else all that ship)",
    )
    command.add_argument(
        "--point", metavar="NAME", action="append", help="this point only; may be repeated"
    )
    _tables(command)


def _convert(command: _Parser) -> None:
    command.description = (
        f"{command.description}\nA VALUE is in ppm unless it has a unit; one VALUE a run. "
        "Each run is dried and\nbrought to 15 % O2 before runs are averaged."
    )
    command.add_argument("values", metavar="VALUE", nargs="+", help='43.2 or "50 mg/Nm3@15"')
    command.add_argument("--species", metavar="S", required=True, help="NOx, CO, UHC, N2O, ...")
    command.add_argument(
        "--o2", metavar="O2", nargs="+", help='one for all or one a run, "14.2 %%"'
    )
    command.add_argument("--wet", action="store_true", help="measured wet, O2 as well")
    command.add_argument(
        "--o2-dry", action="store_true", help="with --wet: the O2 cell saw dry gas"
    )
    command.add_argument("--moisture", metavar="X", help='water in the wet gas, "8 %%"')
    command.add_argument("--fuel", metavar="FUEL", required=True, help="catalogue name or blend")
    command.add_argument(
        "--to",
        metavar="UNIT",
        nargs="+",
        required=True,
        help="ppmvd@15, mg/Nm3@15, g/kg, lb/MMBtu, ...",
    )
    command.add_argument(
        "--air-o2", metavar="O2", help='the rule\'s O2 in air (default "20.95 %%")'
    )
    command.add_argument("--heat-input", metavar="Q", help="LHV, for units per output or time")
    command.add_argument("--output", metavar="W", help="for g/kWh and lb/MWh")
    command.add_argument("--hours", metavar="H", help="operated a year, for t/yr")
    command.add_argument("--ambient-temperature", metavar="T", help="for NOx at the ISO day")
    command.add_argument("--humidity", metavar="H", help="of that air, kg/kg")
    command.add_argument("--ambient-pressure", metavar="P", help="of that air (default 101.3 kPa)")
    command.add_argument(
        "--front-end",
        metavar="KIND",
        choices=("diffusion", "rich-lean", "lean-premixed"),
        default="diffusion",
        help="diffusion (default), rich-lean or lean-premixed",
    )
    _tables(command)


def _rules(command: _Parser) -> None:
    command.add_argument("name", metavar="NAME", nargs="?", help="show this rule set in full")
    command.add_argument(
        "--template", metavar="FILE", help="write a rule file to fill in (with NAME: that set)"
    )
    _tables(command)


_COMMANDS: tuple[tuple[str, str, tuple[str, ...], Callable[[_Parser], None]], ...] = (
    (
        "new",
        "write a commented starter case that runs as it is",
        ("combustor new my.toml", "combustor new my.toml --fuel propane"),
        _new,
    ),
    (
        "size",
        "size the metal and show each dimension with the method behind it",
        ("combustor size my.toml -o sized.toml",),
        _size,
    ),
    (
        "rate",
        "what the metal does: air split, zones, walls, exit, emissions, findings",
        (
            "combustor rate sized.toml",
            "combustor rate sized.toml --point idle --json",
            "combustor rate sized.toml --fuel natural-gas+30%hydrogen --csv tables",
        ),
        _rate,
    ),
    (
        "sweep",
        "trends: vary one or two entries of a case at all its points, in parallel, resumable",
        (
            'combustor sweep sized.toml --vary "hardware.openings.dilution.diameter=40 mm:50 mm:6"',
            "combustor sweep my.toml --vary targets.equivalence_ratio.primary=0.7:1.1:9 "
            '--nox-limit "150 ppm" --co-limit "80 ppm"',
        ),
        _sweep,
    ),
    (
        "switch",
        "the same metal on other fuels, side by side, with a verdict and the changes each needs",
        (
            "combustor switch sized.toml --to natural-gas+30%hydrogen --to hydrogen --to biogas",
            "combustor switch sized.toml --ladder hydrogen --shares 0:100:11 --hold heat",
        ),
        _switch,
    ),
    (
        "comply",
        "emissions against the limits that bind, with margins: a pre-check",
        (
            "combustor comply sized.toml --rules us-40cfr60-kkkk",
            "combustor comply sized.toml --rules my_permit.toml --json",
        ),
        _comply,
    ),
    (
        "flame",
        "quick look at a flame: equilibrium, and a stirred reactor of a residence time",
        (
            'combustor flame methane --phi 0.5 --temperature "700 K" --pressure "20 bar" '
            '--time "5 ms"',
        ),
        _flame,
    ),
    (
        "convert",
        "an emission from the basis it was measured on to others, every step printed",
        (
            'combustor convert 43.2 41.8 --species NOx --o2 "14.2 %" "14.4 %" --fuel natural-gas '
            "--to ppmvd@15 mg/Nm3@15 lb/MMBtu",
        ),
        _convert,
    ),
    (
        "fuels",
        "the fuel catalogue, or one fuel in full",
        ("combustor fuels", "combustor fuels natural-gas+30%hydrogen"),
        _fuels,
    ),
    (
        "rules",
        "the rule sets, or one in full, or a rule file to fill in",
        (
            "combustor rules",
            "combustor rules eu-2015-2193",
            "combustor rules --template my_permit.toml",
        ),
        _rules,
    ),
    (
        "sources",
        "every published method and figure, those a case stands on, or those behind one value",
        (
            "combustor sources",
            "combustor sources my.toml --csv sources",
            "combustor sources my.toml --of penetration_mm",
        ),
        _sources,
    ),
)


def _nearest(word: str, choices: list[str]) -> str:
    from difflib import get_close_matches

    found = get_close_matches(word, choices, n=1)
    return f"; did you mean {found[0]!r}?" if found else ""
