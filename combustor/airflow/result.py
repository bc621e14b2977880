"""What goes into the air split and what comes out of it."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Literal

import numpy as np
from numpy.typing import NDArray

from combustor.base.convergence import Convergence
from combustor.base.method import Notice
from combustor.hardware.metal import Role, Side

Array = NDArray[np.float64]


@dataclass(frozen=True)
class Inlet:
    """Air at the combustor inlet, whole machine.

    Parameters
    ----------
    mass_flow : float
        Moist air, kg/s.
    pressure : float
        Total pressure, Pa.
    temperature : float
        Total temperature, K.
    gas_constant : float
        Specific gas constant, J/kg/K.
    heat_capacity_ratio : float
        At ``temperature``.
    """

    mass_flow: float
    pressure: float
    temperature: float
    gas_constant: float = 287.05
    heat_capacity_ratio: float = 1.38

    @property
    def heat_capacity(self) -> float:
        """Isobaric heat capacity, J/kg/K."""
        ratio = self.heat_capacity_ratio
        return ratio * self.gas_constant / (ratio - 1.0)


@dataclass(frozen=True, eq=False)
class LinerGas:
    """Mean gas inside the liner as the fire leaves it; linear between stations, flat beyond.

    Parameters
    ----------
    station : ndarray
        Axial positions, m, rising.
    temperature : ndarray
        Total temperature, K.
    gas_constant, heat_capacity_ratio : ndarray
        J/kg/K and -.
    fuel_flow : float
        Fuel entering the liner, whole machine, kg/s.
    fuel_station : float
        Where it enters, m.
    """

    station: Array
    temperature: Array
    gas_constant: Array
    heat_capacity_ratio: Array
    fuel_flow: float = 0.0
    fuel_station: float = 0.0


@dataclass(frozen=True, eq=False)
class AnnulusHeat:
    """Heat given to the air of one annulus through the liner wall, whole machine.

    Parameters
    ----------
    side : {"outer", "inner"}
    station : ndarray
        Axial positions, m, rising.
    heat_rate : ndarray
        W/m, linear between stations, zero beyond them.
    """

    side: Literal["outer", "inner"]
    station: Array
    heat_rate: Array


@dataclass(frozen=True)
class OpeningFlow:
    """Air through one row of openings.

    Parameters
    ----------
    name, role, side, station : as in the metal.
    mass_flow : float
        Whole machine, kg/s.
    air_temperature : float
        Total temperature of the air entering it, K.
    discharge_coefficient : float
        Effective over geometric area, referred to the driving pressure of the row's feed
        (annulus total or static) and the liner static pressure; 0 where the row does not flow.
    effective_area : float
        Discharge coefficient times geometric area, whole machine, m2.
    jet_velocity : float
        Velocity with which the air enters the liner, m/s: expanded from the driving pressure to
        the liner's static pressure; for a film with a slot the mean velocity at the lip.
    jet_angle : float
        From the liner axis, rad.
    head_ratio : float
        K, jet head over annulus dynamic head just upstream; infinite where the feed is at rest.
    bleed_ratio : float
        All flow leaving the annulus at this station over the annulus flow just upstream; 0 for
        the dome.
    momentum_flux_ratio : float
        Jet over local liner gas just upstream of the row; infinite where that gas is at rest.
    penetration : float or None
        Largest depth of the jet, m; jets of the liner wall only.
    jet_density : float
        kg/m3.
    liner_pressure : float
        Static pressure in the liner that the row discharges to, Pa.
    driving_pressure : float
        Annulus total or static pressure that drives the row, Pa.
    """

    name: str
    role: Role
    side: Side
    station: float
    mass_flow: float
    air_temperature: float
    discharge_coefficient: float
    effective_area: float
    jet_velocity: float
    jet_angle: float
    head_ratio: float
    bleed_ratio: float
    momentum_flux_ratio: float
    penetration: float | None
    jet_density: float
    liner_pressure: float
    driving_pressure: float


@dataclass(frozen=True, eq=False)
class AnnulusStations:
    """One annulus along x; a row's station appears twice, before and after it (in x).

    Mass flow kg/s (whole machine), pressures Pa, velocity m/s in the direction of flow,
    total temperature K.
    """

    side: Literal["outer", "inner"]
    station: Array
    mass_flow: Array
    total_pressure: Array
    static_pressure: Array
    velocity: Array
    temperature: Array


@dataclass(frozen=True, eq=False)
class LinerStations:
    """Gas inside the liner along x; a row's station appears twice, before and after it.

    Mass flow kg/s (whole machine), static pressure Pa, velocity m/s, density kg/m3, total
    temperature K.
    """

    station: Array
    mass_flow: Array
    static_pressure: Array
    velocity: Array
    density: Array
    temperature: Array


@dataclass(frozen=True)
class LossParts:
    """Parts of the total-pressure loss as fractions of the inlet total; they sum to the loss.

    ``diffuser``: compressor exit to the dump or plenum. ``hot``: by how much more total
    pressure the same streams, entering at the same places from the same head pressure and with
    the same jet momentum, would keep at the liner exit had they not been heated. ``liner``:
    the rest, that is annuli, openings and the mixing of their jets.
    """

    diffuser: float
    liner: float
    hot: float

    def as_mapping(self) -> dict[str, float]:
        """Return the parts by name."""
        return {"diffuser": self.diffuser, "liner": self.liner, "hot": self.hot}


@dataclass(frozen=True, eq=False)
class AirSplit:
    """The solved air split.

    Parameters
    ----------
    openings : tuple of OpeningFlow
        In the order of the metal.
    pressure_loss : float
        (inlet total - exit total) / inlet total.
    pressure_loss_parts : mapping
        "diffuser", "liner", "hot"; see :class:`LossParts`.
    exit_pressure : float
        Total pressure at the liner exit and, the transition being lossless, at its end, Pa.
    exit_static_pressure : float
        Static pressure at the end of the transition, Pa.
    dump_pressure : float
        Total pressure behind the diffuser, Pa.
    dome_pressure : float
        Total pressure that feeds the dome's openings, Pa.
    annuli : tuple of AnnulusStations
        In the order of the metal.
    liner : LinerStations
    imbalance : float
        |sum of opening flows - inlet flow| / inlet flow.
    convergence : Convergence
    notices : tuple of Notice
        Methods used outside their validity, rows that do not flow.
    """

    openings: tuple[OpeningFlow, ...]
    pressure_loss: float
    pressure_loss_parts: Mapping[str, float]
    exit_pressure: float
    exit_static_pressure: float
    dump_pressure: float
    dome_pressure: float
    annuli: tuple[AnnulusStations, ...]
    liner: LinerStations
    imbalance: float
    convergence: Convergence
    notices: tuple[Notice, ...] = ()

    def opening(self, name: str) -> OpeningFlow:
        """Return the flow through the opening called ``name``; KeyError when there is none."""
        for opening in self.openings:
            if opening.name == name:
                return opening
        raise KeyError(name)

    def flow(self, *roles: Role) -> float:
        """Return the air through all openings of the given roles, kg/s (all when none given)."""
        return sum(o.mass_flow for o in self.openings if not roles or o.role in roles)
