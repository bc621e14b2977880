"""Gases and alcohols above what the detailed mechanisms hold, lumped whole from NASA data."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np

from combustor.base.method import Method
from combustor.fuel.cracking import Shares
from combustor.fuel.lumped import Lump
from combustor.fuel.lumped_thermo import Polynomials, pure

HEAVIER_GASES = Method(
    key="lumped-heavier-gases",
    quantity="butanes and heavier gases, ethanol: thermodynamics of the pure substance, cracked "
    "in lumped steps",
    source="NASA data (McBride, Gordon and Reno 1993) in the file that ships with Cantera; "
    "n-hexane as the mean of n-pentane and n-heptane",
    reading="computed",
    note="cracking as for lumped liquids; isomers differ in heat, not in what they crack to",
)


@dataclass(frozen=True)
class Heavier:
    """Names of one substance in the NASA data (averaged where several), and as users write it."""

    nasa: tuple[str, ...]
    names: tuple[str, ...]


SUBSTANCES: tuple[Heavier, ...] = (
    Heavier(("C4H10,n-butane",), ("NC4H10", "N-C4H10", "C4H10")),
    Heavier(("C4H10,isobutane",), ("IC4H10", "I-C4H10")),
    Heavier(("C5H12,n-pentane",), ("NC5H12", "N-C5H12", "C5H12")),
    Heavier(("C5H12,i-pentane",), ("IC5H12", "I-C5H12")),
    Heavier(("C5H12,n-pentane", "C7H16,n-heptane"), ("NC6H14", "N-C6H14", "C6H14")),
    Heavier(("C7H16,n-heptane",), ("NC7H16", "N-C7H16", "C7H16")),
    Heavier(("C4H8,1-butene",), ("C4H8", "C4H8-1")),
    Heavier(("C4H8,isobutene",), ("IC4H8", "I-C4H8")),
    Heavier(("C2H5OH",), ("C2H5OH",)),
)

# what a paraffin of this size cracks to: no benzene, the rest as in lumped liquids
PARAFFIN = Shares(benzene=0.0, propene=0.367, methane=0.127, methyl=0.2, attack=0.75, scission=1.4)


def lumps_of(composition: Mapping[str, float]) -> tuple[Lump, ...]:
    """Return a lumped species for each heavier substance in a mixture, under its name there."""
    known = {name: substance for substance in SUBSTANCES for name in substance.names}
    return tuple(
        _lump(species.upper(), known[species.upper()])
        for species in composition
        if species.upper() in known
    )


def _lump(name: str, substance: Heavier) -> Lump:
    found = [pure(nasa) for nasa in substance.nasa]
    count = len(found)
    atoms = {e: sum(its[e] for its, _ in found) / count for e in found[0][0]}
    thermo = _mean([polynomials for _, polynomials in found])
    return Lump(name, atoms, thermo.ranges, thermo.low, thermo.high, PARAFFIN)


def _mean(rows: list[Polynomials]) -> Polynomials:
    low = np.mean([row.low for row in rows], axis=0)
    high = np.mean([row.high for row in rows], axis=0)
    return Polynomials(rows[0].ranges, tuple(low.tolist()), tuple(high.tolist()))
