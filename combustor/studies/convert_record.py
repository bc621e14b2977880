"""What a conversion is given and what it gives."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

from combustor.emissions.bases import OXYGEN_IN_AIR
from combustor.emissions.fuel_factor import FuelFactors
from combustor.emissions.reference_day import AmbientAir

Moisture = Literal["wet", "dry"]


@dataclass(frozen=True)
class Sample:
    """How the gas was sampled.

    Parameters
    ----------
    oxygen : tuple of float
        Mole fraction as the O2 cell showed it, one a run; empty where no value needs it.
    moisture, oxygen_moisture : {"wet", "dry"}
    water : float or None
        Mole fraction in the wet gas.
    oxygen_in_air : float
        Of dry air, by which O2 is corrected.
    """

    oxygen: tuple[float, ...] = ()
    moisture: Moisture = "dry"
    oxygen_moisture: Moisture = "dry"
    water: float | None = None
    oxygen_in_air: float = OXYGEN_IN_AIR


@dataclass(frozen=True)
class Plant:
    """What a unit per output or per time needs; None is not known.

    Parameters
    ----------
    heat_input : float or None
        On the lower heating value, W.
    output : float or None
        W.
    hours : float or None
        A year.
    ambient : AmbientAir or None
        For the ISO-day correction of NOx.
    front_end : str
    """

    heat_input: float | None = None
    output: float | None = None
    hours: float | None = None
    ambient: AmbientAir | None = None
    front_end: str = "diffusion"


@dataclass(frozen=True)
class Step:
    """One step: what was done and what it gave."""

    what: str
    value: float
    unit: str


@dataclass(frozen=True)
class Result:
    """The emission in one unit asked for; ``note`` says what it rests on."""

    unit: str
    value: float
    note: str = ""


@dataclass(frozen=True)
class Conversion:
    """Everything that was worked out.

    Parameters
    ----------
    species, fuel : str
    oxygen_in_air : float
    runs : tuple of tuple of Step
        One run each.
    mean : float
        Of the corrected runs: mole fraction, dry, at 15 % O2.
    results : tuple of Result
    own, default : FuelFactors
        Of this fuel computed; of its class by regulation, None where there is none.
    notes : tuple of str
    """

    species: str
    fuel: str
    oxygen_in_air: float
    runs: tuple[tuple[Step, ...], ...]
    mean: float
    results: tuple[Result, ...]
    own: FuelFactors
    default: FuelFactors | None
    notes: tuple[str, ...]
