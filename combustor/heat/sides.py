"""What the wall march is given: hot gas, annulus air, film slots, radiation and casing.

Flows and the areas they pass through are on one basis, the whole machine or one can; only
their ratio enters. Stations rise along the axis from the dome face, m.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

import numpy as np
from numpy.typing import ArrayLike, NDArray

FloatArray = NDArray[np.float64]


@dataclass(frozen=True)
class GasSide:
    """Hot gas along the liner.

    Parameters
    ----------
    station : array
        Axial positions, m, not falling; the march spans the first to the last. One given
        twice marks a step there.
    temperature : array
        Bulk gas temperature, K.
    mass_flow, area : array
        Gas flow, kg/s, and the passage area it fills, m2.
    hydraulic_diameter : array
        4 area / wetted perimeter of the passage, m.
    fuel_air_ratio : array
        Burned fuel per air by mass, for luminous radiation.
    pressure : float or array
        Static pressure, Pa.
    x_h2o, x_co2 : array
        Mole fractions of water and carbon dioxide, wet.
    viscosity, conductivity : array or None
        Pa s and W/m/K; ``None`` takes the combustion-gas fits.
    recirculation_end : float or None
        Station up to which the gas recirculates (primary zone), m; ``None``: nowhere.
    """

    station: FloatArray
    temperature: FloatArray
    mass_flow: FloatArray
    area: FloatArray
    hydraulic_diameter: FloatArray
    fuel_air_ratio: FloatArray
    pressure: float | FloatArray
    x_h2o: FloatArray
    x_co2: FloatArray
    viscosity: FloatArray | None = None
    conductivity: FloatArray | None = None
    recirculation_end: float | None = None

    def at(self, name: str, x: ArrayLike) -> FloatArray:
        """Return the array called ``name`` at stations ``x`` (m), linear between stations."""
        return _along(x, self.station, getattr(self, name))


@dataclass(frozen=True)
class AnnulusSide:
    """Air along one annulus.

    Parameters
    ----------
    station : array
        Axial positions, m, not falling; one given twice marks a step there.
    mass_flow, area : array
        kg/s and m2, on one basis. The sign of the flow (reverse-flow machines) is ignored.
    temperature : array
        Air temperature, K.
    hydraulic_diameter : array
        Twice the gap, m.
    viscosity, conductivity : array or None
        Pa s and W/m/K; ``None`` takes the air fits.
    enhancement : float
        Multiplies the coefficient, for fins or impingement; 1 for a plain wall.
    """

    station: FloatArray
    mass_flow: FloatArray
    temperature: FloatArray
    area: FloatArray
    hydraulic_diameter: FloatArray
    viscosity: FloatArray | None = None
    conductivity: FloatArray | None = None
    enhancement: float = 1.0

    def at(self, name: str, x: ArrayLike) -> FloatArray:
        """Return the array called ``name`` at stations ``x`` (m), linear between stations."""
        return _along(x, self.station, getattr(self, name))


@dataclass(frozen=True)
class Film:
    """Air leaving one slot along the wall.

    Parameters
    ----------
    name : str
    station : float
        Where the film meets the gas (lip end), m.
    mass_flow : float
        kg/s, on the basis of the gas flow.
    temperature, density, velocity : float
        At the slot mouth: K, kg/m3, m/s.
    slot_height, lip_thickness : float
        m.
    viscosity, conductivity : float or None
        Pa s and W/m/K; ``None`` takes the air fits.
    """

    name: str
    station: float
    mass_flow: float
    temperature: float
    density: float
    velocity: float
    slot_height: float
    lip_thickness: float
    viscosity: float | None = None
    conductivity: float | None = None

    @classmethod
    def from_slot(
        cls,
        name: str,
        station: float,
        mass_flow: float,
        temperature: float,
        density: float,
        slot_height: float,
        lip_thickness: float,
        length: float,
        cans: int = 1,
    ) -> Film:
        """Return the film whose mouth velocity fills the slot.

        ``mass_flow`` in kg/s for ``cans`` slots, each ``length`` m long around the wall.
        """
        velocity = mass_flow / (density * slot_height * length * cans)
        return cls(
            name, station, mass_flow, temperature, density, velocity, slot_height, lip_thickness
        )


@dataclass(frozen=True)
class Radiation:
    """How the gas radiates.

    Parameters
    ----------
    kind : {"grey-gas", "luminous"}
        Clean gas fuels: CO2 and H2O. Liquids: soot by the luminosity correlation.
    luminosity : float
        Luminosity factor of the luminous correlation, 1 for a clear flame.
    constant : float
        Constant of the luminous correlation (kPa, m).
    broadening : bool
        Whether the grey-gas emissivity is raised for pressure broadening.
    """

    kind: Literal["grey-gas", "luminous"]
    luminosity: float = 1.0
    constant: float = 290.0
    broadening: bool = True


@dataclass(frozen=True)
class Casing:
    """Heat path from the casing.

    Parameters
    ----------
    loss_coefficient : float or None
        Casing inside to ambient, W/m2/K on the casing's inside area. ``None`` holds the
        casing at the annulus air temperature and loses nothing: all heat ends in the air.
    ambient_temperature : float
        K.
    """

    loss_coefficient: float | None = None
    ambient_temperature: float = 288.15


def _along(x: ArrayLike, station: FloatArray, value: float | FloatArray) -> FloatArray:
    x = np.asarray(x, dtype=float)
    if np.ndim(value) == 0:
        return np.full(x.shape, float(value))
    return np.interp(x, station, value)
