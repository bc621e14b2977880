"""The fuel catalogue: one line a fuel, or one fuel in full."""

from __future__ import annotations

from collections.abc import Iterable
from typing import Any

from combustor.fuel.record import Fuel
from combustor.report import fields
from combustor.report.cautions import sentence
from combustor.report.document import Block, Facts, Heading, Prose, Table
from combustor.report.field import Field, row


def fuels_table(fuels: Iterable[Fuel]) -> Table:
    """Return one line a fuel; volumes at 15 degC and 101.325 kPa, heat at 15 degC."""
    columns = tuple(field for field in fields.FUEL if field.key != "phase")
    return Table(
        "fuels",
        "Fuels (15 degC; gases ideal at 101.325 kPa, liquids as liquid)",
        columns,
        tuple(fuels),
    )


def fuel_report(fuel: Fuel) -> tuple[Block, ...]:
    """Return everything known of one fuel."""
    shares = sorted(fuel.composition.items(), key=lambda item: -item[1])
    facts = [("mole fractions", ", ".join(f"{name} {100 * x:.4g} %" for name, x in shares))]
    facts += [(_flat(f), f.with_unit(fuel)) for f in fields.FUEL if f.key != "name"]
    facts += [
        ("hydrogen in the fuel", f"{100 * fuel.hydrogen_mass_fraction:.2f} % by mass"),
        *_of_liquid(fuel),
        ("heating values from", fuel.heating_value_basis),
        ("mechanism", fuel.mechanism_note),
        ("composition from", fuel.source),
    ]
    return (
        Heading(f"Fuel {fuel.name}"),
        Prose(
            "Heating values and densities at 15 degC; gases as ideal gas at 101.325 kPa, "
            "liquid fuels as liquid."
        ),
        Facts(tuple(facts)),
        *(Prose(sentence(caution)) for caution in fuel.cautions),
    )


def _of_liquid(fuel: Fuel) -> list[tuple[str, str]]:
    liquid = fuel.liquid
    if liquid is None:
        return []
    atoms = ", ".join(f"{element} {count:.4g}" for element, count in fuel.atoms.items())
    return [
        ("mean molecule", atoms),
        ("latent heat", f"{1e-3 * liquid.latent_heat:.0f} kJ/kg, taken from the air"),
        ("liquid heat capacity", f"{1e-3 * liquid.heat_capacity:.2f} kJ/kg/K"),
        ("viscosity", f"{1e3 * liquid.viscosity:.2f} mPa.s"),
        ("surface tension", f"{1e3 * liquid.surface_tension:.1f} mN/m"),
        ("aromatics", f"{100 * liquid.aromatics:.1f} % by volume"),
        ("sulfur, bound nitrogen", f"{1e6 * liquid.sulfur:.0f}, {1e6 * liquid.nitrogen:.0f} mg/kg"),
    ]


def fuels_data(fuels: Iterable[Fuel]) -> tuple[Table, ...]:
    """Return the CSV tables: properties, and composition line by line."""
    fuels = tuple(fuels)
    lines = tuple(
        {"fuel": fuel.name, "species": species, "share": share}
        for fuel in fuels
        for species, share in fuel.composition.items()
    )
    composition = (
        Field("fuel", "fuel"),
        Field("species", "species"),
        Field("mole_percent", "share", "share", "%", 100.0, decimals=3),
    )
    return (
        Table("fuels", "Fuels", fields.FUEL, fuels),
        Table("composition", "Composition", composition, lines, lead=2),
    )


FUEL_TABLES = ("fuels", "composition")


def fuels_document(fuels: Iterable[Fuel], version: str) -> dict[str, Any]:
    """Return the document of ``fuels --json``."""
    return {"version": version, "fuels": [_fuel_document(fuel) for fuel in fuels]}


def _fuel_document(fuel: Fuel) -> dict[str, Any]:
    return {
        **row(fields.FUEL, fuel),
        "composition": dict(fuel.composition),
        "heating_value_basis": fuel.heating_value_basis,
        "mechanism": fuel.mechanism_note,
        "source": fuel.source,
        "cautions": list(fuel.cautions),
    }


def _flat(field: Field) -> str:
    return field.label.replace("-\n", "").replace("\n", " ")
