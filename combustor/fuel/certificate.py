"""A liquid fuel as its certificate states it, checked against what a fuel can be."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass, fields, replace
from math import exp, isfinite

from combustor.base.errors import InputError, Problem
from combustor.base.method import Method
from combustor.fuel.composition import ATOMIC_MASS

MOLAR_MASS_RIAZI_DAUBERT = Method(
    key="molar-mass-riazi-daubert",
    quantity="molar mass of a petroleum cut from mid-boiling point and density",
    source="Riazi and Daubert 1980, as adopted in API procedure 2B2.1",
    reading="from memory",
    validity={"mid_boiling_point": (305.0, 840.0), "molar_mass": (0.070, 0.700)},
    scatter="about 3 %",
)
HEAT_FROM_ELEMENTS = Method(
    key="heat-from-elements",
    quantity="net heating value a liquid of given C, H and O should have",
    source="36.0 C + 88.8 H - 9.5 O in MJ/kg by mass, through liquid octane, benzene and "
    "methanol; ethanol falls within 1 % of it, jet fuels, diesel and methyl esters within 2 %",
    reading="derived",
    note="a plausibility check only: a stated heating value is used as stated",
)
LATENT_HEAT = Method(
    key="latent-heat-jet-a",
    quantity="latent heat of a kerosene-type fuel at 25 degC, where none is stated",
    source="difference of Jet-A(g) and Jet-A(L) in the NASA thermodynamic data (McBride, Gordon "
    "and Reno 1993), read in the files that ship with Cantera: 53.75 kJ/mol of C12H23",
    reading="computed",
    scatter="10 % between kerosenes; diesel lies about 10 % lower per mass",
)
AROMATICS_FROM_HYDROGEN = Method(
    key="aromatics-from-hydrogen",
    quantity="aromatics where none are stated: 18 % by volume at 13.8 % hydrogen, none at 15.3 %",
    source="straight line through average Jet A and synthetic paraffinic kerosene",
    reading="common practice, no source",
    scatter="5 % by volume",
)

# kJ per kg and per kg of each element, HEAT_FROM_ELEMENTS
_CARBON_HEAT, _HYDROGEN_HEAT, _OXYGEN_HEAT = 36.0e6, 88.8e6, -9.5e6
DOUBTFUL_HEAT, IMPOSSIBLE_HEAT = 0.03, 0.10
LATENT_DEFAULT = 53.75e3 / 167.31e-3  # J/kg, LATENT_HEAT
LIQUID_HEAT_CAPACITY = 2000.0  # J/kg/K, kerosene at 20 to 60 degC, common practice
TRACE = 1e-9  # mass fraction below which an element is left out
LEAST_HYDROGEN = 0.06  # naphthalene holds 6.3 %
ALLOWED: Mapping[str, tuple[float, float]] = {
    "hydrogen": (LEAST_HYDROGEN, 0.26),
    "oxygen": (0.0, 0.52),
    "nitrogen": (0.0, 0.02),
    "sulfur": (0.0, 0.05),
    "aromatics": (0.0, 1.0),
    "net_heating_value": (1e6, 6e7),
    "density": (500.0, 1100.0),
    "molar_mass": (0.030, 0.500),
    "mid_boiling_point": (300.0, 700.0),
    "latent_heat": (1e5, 1.5e6),
    "heat_capacity": (1000.0, 4000.0),
    "viscosity": (1e-4, 2e-2),
    "surface_tension": (1e-2, 8e-2),
}


@dataclass(frozen=True)
class Certificate:
    """What a supplier states of a liquid fuel; SI, fractions by mass unless said otherwise.

    Parameters
    ----------
    net_heating_value : float
        Lower, of the liquid, J/kg. Measured at 25 degC; at 15 degC it differs by 0.003 %.
    density : float
        At 15 degC, kg/m3.
    hydrogen : float
        Or give ``hydrogen_carbon_ratio`` to `stated`.
    oxygen, nitrogen, sulfur : float
        Nitrogen bound in the fuel becomes hydrogen cyanide and so NOx.
    molar_mass : float or None
        kg/mol; None takes it from ``mid_boiling_point``, K.
    latent_heat : float or None
        At 15 degC, J/kg; None takes that of kerosene.
    aromatics : float or None
        By volume; None is estimated from hydrogen.
    heat_capacity, viscosity, surface_tension : float
        Of the liquid: J/kg/K; Pa s and N/m at injection.
    """

    net_heating_value: float
    density: float
    hydrogen: float
    oxygen: float = 0.0
    nitrogen: float = 0.0
    sulfur: float = 0.0
    molar_mass: float | None = None
    mid_boiling_point: float | None = None
    latent_heat: float | None = None
    aromatics: float | None = None
    heat_capacity: float = LIQUID_HEAT_CAPACITY
    viscosity: float = 1.3e-3
    surface_tension: float = 0.0255

    @property
    def carbon(self) -> float:
        """Carbon by mass."""
        return 1.0 - self.hydrogen - self.oxygen - self.nitrogen - self.sulfur

    @property
    def mole(self) -> float:
        """Molar mass, stated or from the mid-boiling point, kg/mol."""
        if self.molar_mass is not None:
            return self.molar_mass
        assert self.mid_boiling_point is not None
        return molar_mass_riazi_daubert(self.mid_boiling_point, self.density)

    @property
    def latent(self) -> float:
        """Latent heat, stated or that of kerosene, J/kg."""
        return LATENT_DEFAULT if self.latent_heat is None else self.latent_heat

    @property
    def aromatic_volume(self) -> float:
        """Aromatics by volume, stated or estimated."""
        if self.aromatics is not None:
            return self.aromatics
        if self.oxygen > 0.0:
            return 0.0
        return float(min(max(0.18 * (0.153 - self.hydrogen) / 0.015, 0.0), 1.0))

    @property
    def atoms(self) -> dict[str, float]:
        """Atoms of the lumped molecule: C, H, O, N scaled to the whole molar mass."""
        parts = {"C": self.carbon, "H": self.hydrogen, "O": self.oxygen, "N": self.nitrogen}
        scale = self.mole / (1.0 - self.sulfur)
        return {e: p * scale / ATOMIC_MASS[e] for e, p in parts.items() if p > TRACE}

    @property
    def expected_heat(self) -> float:
        """Net heating value its elements suggest, J/kg (``HEAT_FROM_ELEMENTS``)."""
        burnt = self.carbon * _CARBON_HEAT + self.hydrogen * _HYDROGEN_HEAT
        return burnt + self.oxygen * _OXYGEN_HEAT

    def remarks(self) -> tuple[str, ...]:
        """Return what a user must know: estimates made, and what looks doubtful."""
        said = []
        if self.molar_mass is None:
            said.append(
                f"molar mass {1e3 * self.mole:.0f} g/mol estimated from mid-boiling point and "
                "density (Riazi and Daubert 1980)"
            )
        if self.latent_heat is None:
            said.append(f"latent heat not stated: {1e-3 * self.latent:.0f} kJ/kg of kerosene taken")
        if self.aromatics is None and self.oxygen == 0.0:
            said.append(
                f"aromatics not stated: {100 * self.aromatic_volume:.0f} % by volume estimated "
                "from hydrogen"
            )
        off = self.net_heating_value / self.expected_heat - 1.0
        if abs(off) > DOUBTFUL_HEAT:
            said.append(
                f"the net heating value lies {100 * off:+.1f} % off what its elements suggest "
                f"({1e-6 * self.expected_heat:.2f} MJ/kg): check the certificate"
            )
        if self.sulfur > 0.0:
            said.append(
                f"sulfur {1e6 * self.sulfur:.0f} mg/kg burns to SO2 beside the chemistry worked out"
            )
        if self.nitrogen > 0.0:
            said.append(
                f"bound nitrogen {1e6 * self.nitrogen:.0f} mg/kg is released as hydrogen cyanide "
                "and adds to NOx"
            )
        return tuple(said)


def molar_mass_riazi_daubert(mid_boiling_point: float, density: float) -> float:
    """Return the molar mass of a petroleum cut, kg/mol.

    Parameters
    ----------
    mid_boiling_point : float
        K.
    density : float
        At 15 degC, kg/m3.

    Source
    ------
    ``MOLAR_MASS_RIAZI_DAUBERT``.
    """
    boiling, gravity = mid_boiling_point, density / 999.0
    power = boiling**1.26007 * gravity**4.98308
    exponent = 2.097e-4 * boiling - 7.78712 * gravity + 2.08476e-3 * boiling * gravity
    return 42.965e-3 * exp(exponent) * power


def hydrogen_of_ratio(ratio: float, oxygen: float, nitrogen: float, sulfur: float) -> float:
    """Return hydrogen by mass from the atomic H/C ratio and the other elements by mass."""
    left = 1.0 - oxygen - nitrogen - sulfur
    part = ratio * ATOMIC_MASS["H"]
    return left * part / (part + ATOMIC_MASS["C"])


def checked(certificate: Certificate, key: str = "fuel.certificate") -> Certificate:
    """Return the certificate if such a fuel can be.

    Raises
    ------
    InputError
        Everything that cannot be, with the reason.
    """
    problems = [*_outside(certificate, key)]
    if not problems:
        problems = [*_contradictions(certificate, key)]
    if problems:
        raise InputError(problems)
    return certificate


def _outside(certificate: Certificate, key: str) -> Iterator[Problem]:
    for field in fields(Certificate):
        value = getattr(certificate, field.name)
        if value is None:
            continue
        low, high = ALLOWED[field.name]
        if not (isfinite(value) and low <= value <= high):
            yield Problem(
                "outside what a liquid fuel can have",
                key=f"{key}.{field.name}",
                value=value,
                allowed=f"{low:g} to {high:g} in SI units, fractions as fractions",
            )
    if certificate.molar_mass is None and certificate.mid_boiling_point is None:
        yield Problem(
            "neither molar mass nor mid-boiling point",
            key=key,
            allowed="state molar_mass or mid_boiling_point (the 50 % point of the distillation)",
        )


def _contradictions(certificate: Certificate, key: str) -> Iterator[Problem]:
    if certificate.carbon < 0.3:
        yield Problem(
            f"hydrogen, oxygen, nitrogen and sulfur leave {100 * certificate.carbon:.3g} % carbon",
            key=key,
            allowed="a liquid fuel holds at least 30 % carbon by mass",
        )
        return
    atoms = certificate.atoms
    bound = 2.0 * atoms["C"] + 2.0 + atoms.get("N", 0.0)
    # the molar mass is known to a few percent, and with it the two hydrogen atoms of the chain ends
    if atoms["H"] > bound * 1.01:
        most = bound / atoms["C"]
        yield Problem(
            f"more hydrogen than the carbon can bind: H/C {atoms['H'] / atoms['C']:.2f}, saturated "
            f"chains of this molar mass have {most:.2f}",
            key=f"{key}.hydrogen",
            value=certificate.hydrogen,
            allowed="liquid hydrocarbons hold 6 to 16 % hydrogen by mass; lower the hydrogen or "
            "check the molar mass",
        )
    off = certificate.net_heating_value / certificate.expected_heat - 1.0
    if abs(off) > IMPOSSIBLE_HEAT:
        yield Problem(
            f"no fuel of these elements has this heating value: {100 * certificate.carbon:.1f} % "
            f"carbon, {100 * certificate.hydrogen:.1f} % hydrogen and "
            f"{100 * certificate.oxygen:.1f} % oxygen give about "
            f"{1e-6 * certificate.expected_heat:.1f} MJ/kg net",
            key=f"{key}.net_heating_value",
            value=certificate.net_heating_value,
            allowed=f"within {100 * IMPOSSIBLE_HEAT:.0f} % of that; state the net (lower) value "
            "per mass of the liquid",
        )


def mixed(parts: Mapping[Certificate, float]) -> Certificate:
    """Return the certificate of liquids mixed by volume.

    Masses, heats and elements add by mass, aromatics by volume, molecules by mole; viscosity
    and surface tension are taken as volume means, which is rough.

    Parameters
    ----------
    parts : mapping of Certificate to float
        Volume shares, summing to one.
    """
    density = sum(share * c.density for c, share in parts.items())
    mass = {c: share * c.density / density for c, share in parts.items()}

    def by_mass(name: str) -> float:
        return sum(part * getattr(c, name) for c, part in mass.items())

    def by_volume(name: str) -> float:
        return sum(share * getattr(c, name) for c, share in parts.items())

    first = next(iter(parts))
    return replace(
        first,
        net_heating_value=by_mass("net_heating_value"),
        density=density,
        hydrogen=by_mass("hydrogen"),
        oxygen=by_mass("oxygen"),
        nitrogen=by_mass("nitrogen"),
        sulfur=by_mass("sulfur"),
        molar_mass=1.0 / sum(part / c.mole for c, part in mass.items()),
        mid_boiling_point=None,
        latent_heat=by_mass("latent"),
        aromatics=by_volume("aromatic_volume"),
        heat_capacity=by_mass("heat_capacity"),
        viscosity=by_volume("viscosity"),
        surface_tension=by_volume("surface_tension"),
    )
