"""The wall of the published balance: annular liner at 16 bar, film air at 750 K."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from combustor.hardware.metal import AxialProfile, LinerWall
from combustor.heat.sides import AnnulusSide, Film, GasSide, Radiation
from combustor.heat.wall import WallMarch, march

T3 = 750.0
TG = 2000.0


class Bench:
    """A wall in uniform gas and air, every property stated, to be varied one at a time."""

    def __init__(self) -> None:
        self.wall = LinerWall(
            side="outer",
            perimeter=AxialProfile.constant(1.6),
            beam_length=0.03655,
            thickness=1.2e-3,
            conductivity=26.0,
            emissivity=0.8,
            casing_emissivity=12.0 / 17.0,  # makes the exchange factor 0.6
            casing_area_ratio=1.0,
        )
        flat = np.ones(2)
        self.gas = GasSide(
            station=np.array([0.0, 0.1]),
            temperature=TG * flat,
            mass_flow=209.0 * flat,
            area=flat,
            hydraulic_diameter=0.0731 * flat,
            fuel_air_ratio=0.03 * flat,
            pressure=1.6e6,
            x_h2o=0.10 * flat,
            x_co2=0.05 * flat,
            viscosity=6.8e-5 * flat,
            conductivity=0.125 * flat,
        )
        self.air = AnnulusSide(
            station=np.array([0.0, 0.1]),
            mass_flow=370.0 * flat,
            temperature=T3 * flat,
            area=flat,
            hydraulic_diameter=0.01565 * flat,
            viscosity=3.56e-5 * flat,
            conductivity=0.0548 * flat,
        )
        self.radiation = Radiation("luminous", luminosity=1.7)

    def film(self, blowing_ratio: float, station: float = 0.0, name: str = "slot") -> Film:
        return Film(
            name=name,
            station=station,
            mass_flow=0.5,
            temperature=T3,
            density=7.432,
            velocity=blowing_ratio * 209.0 / 7.432,
            slot_height=1.5e-3,
            lip_thickness=0.6e-3,
            viscosity=3.56e-5,
            conductivity=0.0548,
        )

    def march(self, films: tuple[Film, ...] = (), **options: object) -> WallMarch:
        return march(self.wall, self.gas, films, self.air, self.radiation, **options)  # type: ignore[arg-type]

    def change(self, part: str, **values: object) -> None:
        setattr(self, part, replace(getattr(self, part), **values))


@pytest.fixture
def bench() -> Bench:
    return Bench()


@pytest.fixture(scope="session")
def new_bench() -> type[Bench]:
    """Build a fresh bench inside a property test, where fixtures are shared by examples."""
    return Bench
