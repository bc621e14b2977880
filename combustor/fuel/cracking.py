"""Cracking of a lumped fuel molecule: products that balance for any formula, and their rates."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

from combustor.base.errors import InputError, Problem
from combustor.base.method import Method

BENZENE, PROPENE = "C6H6", "C3H6,propylene"
RADICALS_OF_ATTACK = 1.0  # an attacked molecule leaves one radical behind
RADICALS_OF_SCISSION = 2.0  # a broken one leaves two
ROUNDING = 1e-12

LUMPED_CRACKING = Method(
    key="lumped-cracking",
    quantity="products of a fuel molecule: ethene, propene, benzene, methane, acetylene, CH3, H",
    source="lumped pyrolysis as in H. Wang, R. Xu et al., Combustion and Flame 193 (2018) 502; "
    "product shares tuned to stirred reactors of their 201-species model of Jet A, half of the "
    "points used",
    reading="from memory",
    validity={"pressure": (4e5, 3e6), "equivalence_ratio": (0.4, 1.3)},
    scatter="see DEVELOPERS.md: temperature 10 K, CO 20 %, lean NOx 40 %, blow-out time 1.5",
    note="flames only: there is no ignition chemistry below about 1200 K",
)
HYDROGEN_ABSTRACTION = Method(
    key="hydrogen-abstraction-tsang",
    quantity="rate at which H, OH, O, CH3, HO2 and O2 attack a fuel, by its hydrogen atoms",
    source="W. Tsang, J. Phys. Chem. Ref. Data 17 (1988) 887, secondary C-H bonds of propane "
    "(OH: N. Cohen, Int. J. Chem. Kinet. 23, 1991), per hydrogen atom",
    reading="from memory",
    scatter="factor 2; flames hardly depend on it",
)
BOND_SCISSION = Method(
    key="bond-scission",
    quantity="rate at which a fuel breaks up by heat alone, by its carbon-carbon bonds",
    source="1e17 1/s per bond and 82 kcal/mol, the usual size for alkanes",
    reading="common practice, no source",
    scatter="factor 10; flames hardly depend on it",
)


@dataclass(frozen=True)
class Attack:
    """Rate per hydrogen atom: cm3/(mol s), exponent of T, cal/mol; what the attacker becomes."""

    factor: float
    exponent: float
    activation: float
    becomes: str


# HYDROGEN_ABSTRACTION
ATTACKS: Mapping[str, Attack] = {
    "H": Attack(0.65e6, 2.4, 4471.0, "H2"),
    "OH": Attack(2.3e7, 1.61, -35.0, "H2O"),
    "O": Attack(2.4e4, 2.71, 2106.0, "OH"),
    "CH3": Attack(0.75, 3.46, 5481.0, "CH4"),
    "HO2": Attack(4.8e3, 2.6, 13910.0, "H2O2"),
    "O2": Attack(2.0e13, 0.0, 47590.0, "HO2"),
}
# BOND_SCISSION
SCISSION_FACTOR = 1e17  # 1/s per carbon-carbon bond
SCISSION_ACTIVATION = 82e3  # cal/mol


@dataclass(frozen=True)
class Shares:
    """How the carbon of a cracked molecule is shared out.

    Parameters
    ----------
    benzene, propene, methane : float
        Of the carbon that is left when radicals and oxygen have taken theirs.
    methyl : float
        Of the radicals left behind; the others are hydrogen atoms.
    attack, scission : float
        On the rates of `ATTACKS` and of `BOND_SCISSION`.
    """

    benzene: float
    propene: float
    methane: float
    methyl: float
    attack: float = 1.0
    scission: float = 1.0


def products(atoms: Mapping[str, float], radicals: float, shares: Shares) -> dict[str, float]:
    """Return what a molecule cracks to, balanced exactly in C, H, O and N.

    Oxygen leaves as formaldehyde, nitrogen as hydrogen cyanide. What is left over between the
    stated shares is ethene, with acetylene where hydrogen is short of it and methane where it is
    in surplus. A hydrogen-poor molecule gives less propene and methane than stated; methyl
    takes no more carbon than oxygen leaves.

    Parameters
    ----------
    atoms : mapping of str to float
        Of the molecule, less what an attacker has taken.
    radicals : float
        Left behind, CH3 and H together.
    shares : Shares

    Raises
    ------
    InputError
        A formula with too little or too much hydrogen to crack at all.
    """
    carbon, hydrogen = atoms.get("C", 0.0), atoms.get("H", 0.0)
    oxygen, nitrogen = atoms.get("O", 0.0), atoms.get("N", 0.0)
    carbon -= oxygen + nitrogen
    hydrogen -= 2.0 * oxygen + nitrogen
    methyl = min(shares.methyl * radicals, carbon)
    left = carbon - methyl
    rest = hydrogen - 3.0 * methyl - (radicals - methyl)
    # propene and methane take more hydrogen than carbon: no more than there is
    taken = (shares.propene + 3.0 * shares.methane) * left
    part = min(1.0, max(rest - left, 0.0) / taken) if taken > 0.0 else 1.0
    propene, methane = part * shares.propene * left, part * shares.methane * left
    benzene = min(shares.benzene * left, left - propene - methane)
    plain = left - benzene - propene - methane
    bound = rest - benzene - 2.0 * propene - 4.0 * methane
    if not (left >= 0.0 and plain - ROUNDING <= bound <= 4.0 * plain + ROUNDING):
        raise InputError(
            Problem(
                "this formula cannot be cracked into smaller molecules",
                key="fuel",
                value={element: round(count, 3) for element, count in atoms.items()},
                allowed="hydrocarbons from aromatics to paraffins, alcohols and ethers",
            )
        )
    if bound <= 2.0 * plain:
        ethene, acetylene = (bound - plain) / 2.0, (2.0 * plain - bound) / 2.0
    else:
        surplus = (bound - 2.0 * plain) / 2.0
        ethene, acetylene, methane = (plain - surplus) / 2.0, 0.0, methane + surplus
    made = {
        "C2H4": ethene,
        "C2H2": acetylene,
        "CH4": methane,
        PROPENE: propene / 3.0,
        BENZENE: benzene / 6.0,
        "CH3": methyl,
        "H": radicals - methyl,
        "CH2O": oxygen,
        "HCN": nitrogen,
    }
    return {species: amount for species, amount in made.items() if amount > ROUNDING}
