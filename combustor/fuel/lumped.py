"""Lumped fuel species: one molecule that stands for a fuel a mechanism does not hold.

A fuel with lumped species names its mechanism as the base file, a ``#`` and the species as text,
so that it travels between processes and can be loaded anywhere like any other.
"""

from __future__ import annotations

import json
from collections.abc import Iterable, Mapping
from dataclasses import dataclass
from pathlib import Path

import cantera as ct

from combustor.fuel.cracking import (
    ATTACKS,
    RADICALS_OF_ATTACK,
    RADICALS_OF_SCISSION,
    SCISSION_ACTIVATION,
    SCISSION_FACTOR,
    Shares,
    products,
)

BASE = "lumped-base.yaml"
MARK = "#"
CALORIE = 4.184  # J
PER_KILOMOLE = 1e3
CUBIC_CENTIMETRE_PER_MOLE = 1e-3  # in m3/kmol


@dataclass(frozen=True)
class Lump:
    """One lumped species.

    Parameters
    ----------
    name : str
        Of the species, upper case.
    atoms : mapping of str to float
        Fractional counts allowed.
    ranges : tuple of float
        Temperatures that bound the two polynomials, K.
    low, high : tuple of float
        NASA polynomials of seven terms below and above the middle temperature.
    shares : Shares
        What it cracks to.
    """

    name: str
    atoms: Mapping[str, float]
    ranges: tuple[float, float, float]
    low: tuple[float, ...]
    high: tuple[float, ...]
    shares: Shares

    def species(self) -> ct.Species:
        """Return it as Cantera wants it."""
        species = ct.Species(self.name, dict(self.atoms))
        lowest, middle, highest = self.ranges
        species.thermo = ct.NasaPoly2(lowest, highest, ct.one_atm, [middle, *self.high, *self.low])
        return species

    def reactions(self) -> list[ct.Reaction]:
        """Return its break-up by heat and by attack, each balanced exactly and irreversible."""
        hydrogen, bonds = self.atoms["H"], max(self.atoms["C"] - 1.0, 1.0)
        made = products(self.atoms, RADICALS_OF_SCISSION, self.shares)
        factor = self.shares.scission * SCISSION_FACTOR * bonds
        found = [_step({self.name: 1.0}, made, factor, 0.0, SCISSION_ACTIVATION)]
        residue = {**self.atoms, "H": hydrogen - 1.0}
        for attacker, rate in ATTACKS.items():
            made = products(residue, RADICALS_OF_ATTACK, self.shares)
            made[rate.becomes] = made.get(rate.becomes, 0.0) + 1.0
            factor = self.shares.attack * rate.factor * hydrogen * CUBIC_CENTIMETRE_PER_MOLE
            reactants = {self.name: 1.0, attacker: 1.0}
            found.append(_step(reactants, made, factor, rate.exponent, rate.activation))
        return found


def _step(
    reactants: Mapping[str, float],
    made: Mapping[str, float],
    factor: float,
    exponent: float,
    activation: float,
) -> ct.Reaction:
    rate = ct.ArrheniusRate(factor, exponent, activation * CALORIE * PER_KILOMOLE)
    reaction = ct.Reaction(dict(reactants), dict(made), rate)
    reaction.reversible = False
    return reaction


def mechanism_with(lumps: Iterable[Lump], base: str | Path) -> str:
    """Return the text under which the base mechanism with these species is loaded."""
    rows = [
        {
            "name": lump.name,
            "atoms": dict(lump.atoms),
            "ranges": lump.ranges,
            "low": lump.low,
            "high": lump.high,
            "shares": vars(lump.shares),
        }
        for lump in sorted({lump.name: lump for lump in lumps}.values(), key=lambda x: x.name)
    ]
    return f"{base}{MARK}{json.dumps(rows, separators=(',', ':'))}" if rows else str(base)


def parted(mechanism: str | Path) -> tuple[str, tuple[Lump, ...]]:
    """Return the file a mechanism is read from, and the lumped species added to it."""
    file, mark, text = str(mechanism).partition(f"{MARK}[")
    if not mark:
        return str(mechanism), ()
    return file, tuple(
        Lump(
            name=row["name"],
            atoms=row["atoms"],
            ranges=tuple(row["ranges"]),
            low=tuple(row["low"]),
            high=tuple(row["high"]),
            shares=Shares(**row["shares"]),
        )
        for row in json.loads(f"[{text}")
    )


def with_lumps(base: ct.Solution, lumps: Iterable[Lump]) -> ct.Solution:
    """Return a mechanism with lumped species added to it."""
    lumps = tuple(lumps)
    return ct.Solution(
        thermo="ideal-gas",
        kinetics="gas",
        transport_model="none",
        name="lumped fuel",
        species=[*base.species(), *(lump.species() for lump in lumps)],
        reactions=[*base.reactions(), *(step for lump in lumps for step in lump.reactions())],
    )
