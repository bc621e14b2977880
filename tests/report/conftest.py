"""Ratings made by hand, so that what is printed can be checked against known values."""

from __future__ import annotations

import math
from dataclasses import replace

import numpy as np
import pytest

from combustor.airflow.result import AirSplit, LinerStations, OpeningFlow
from combustor.base.convergence import Convergence
from combustor.base.finding import Finding
from combustor.emissions.exhaust import Emissions
from combustor.hardware.metal import (
    AxialProfile,
    Diffuser,
    Hardware,
    Opening,
    Passage,
    Zone,
)
from combustor.rating.record import (
    ExitRecord,
    InletRecord,
    PointRating,
    Profile,
    Ratings,
    WallPoint,
    ZoneRecord,
)

STATIONS = np.linspace(0.0, 0.6, 61)


def metal() -> Hardware:
    openings = (
        Opening("swirler", "swirler", "dome", 0.0, 1, 4.0e-3, "swirler", "total"),
        Opening(
            "dil_2", "dilution", "outer", 0.45, 8, math.pi / 4 * 0.0305**2, "plain", "total", 0.0305
        ),
        Opening("seals", "leak", "outer", 0.55, 1, 2.0e-4, "orifice", "total"),
    )
    area = AxialProfile.constant(0.12)
    return Hardware(
        layout="can",
        cans=1,
        flow="straight",
        reference_area=0.15,
        reference_height=0.44,
        liner_height=0.39,
        liner=Passage("liner", area, AxialProfile.constant(0.39)),
        liner_length=0.6,
        transition_length=0.25,
        exit_area=0.1,
        annuli=(),
        walls=(),
        diffuser=Diffuser("dump", 0.02, 0.03, 0.1, 0.4),
        openings=openings,
        zones=(Zone("primary", 0, 0.2), Zone("secondary", 0.2, 0.35), Zone("dilution", 0.35, 0.6)),
    )


def flow(name: str, role: str, mass_flow: float, penetration: float | None) -> OpeningFlow:
    return OpeningFlow(
        name=name,
        role=role,
        side="dome" if role == "swirler" else "outer",
        station=0.45,
        mass_flow=mass_flow,
        air_temperature=598.0,
        discharge_coefficient=0.6234,
        effective_area=3.5e-3,
        jet_velocity=98.76,
        jet_angle=math.pi / 3,
        head_ratio=math.inf,
        bleed_ratio=0.1,
        momentum_flux_ratio=math.inf,
        penetration=penetration,
        jet_density=5.7,
        liner_pressure=9.5e5,
        driving_pressure=9.8e5,
    )


def air_split() -> AirSplit:
    none = np.zeros(0)
    return AirSplit(
        openings=(
            flow("swirler", "swirler", 1.42, None),
            flow("dil_2", "dilution", 12.496, 0.1234),
            flow("seals", "leak", 0.284, None),
        ),
        pressure_loss=0.0451,
        pressure_loss_parts={"diffuser": 0.008, "liner": 0.0345, "hot": 0.0026},
        exit_pressure=9.4535e5,
        exit_static_pressure=9.4e5,
        dump_pressure=9.82e5,
        dome_pressure=9.82e5,
        annuli=(),
        liner=LinerStations(none, none, none, none, none, none),
        imbalance=1e-12,
        convergence=Convergence(True, 1e-12, 4),
    )


def burning() -> PointRating:
    wall = 1000.0 + 150.0 * np.sin(STATIONS / 0.6 * math.pi)
    return PointRating(
        name="full",
        kind="rated",
        fuel="natural-gas",
        status="burning",
        inlet=InletRecord(14.2, 9.9e5, 598.15, 0.00634),
        fuel_flow=0.245,
        fuel_air_ratio=0.01736,
        equivalence_ratio=0.2912,
        pressure_loss=0.0451,
        pressure_loss_parts={"diffuser": 0.008, "liner": 0.0345, "hot": 0.0026},
        split=air_split(),
        zones=(
            ZoneRecord("primary", 0.951, 2214.6, 0.00431, 0.3061),
            ZoneRecord("exit", 0.2912, 1273.15, 0.0183, 1.0),
        ),
        profile=Profile(
            STATIONS[:3],
            np.array([2200.0, 1800.0, 1273.0]),
            np.array([math.nan, 1.9e-4, 2.5e-4]),
            np.array([math.nan, 8e-4, 6e-6]),
        ),
        exit=ExitRecord(1273.15, 9.4535e5, 0.99987, 0.152),
        walls=tuple(
            WallPoint(float(x), "outer", float(t), 0.7, float(t) - 12.0, 2.1e5, 9.4e4)
            for x, t in zip(STATIONS, wall, strict=True)
        ),
        emissions=Emissions(
            ei_nox=0.01143,
            ei_co=0.000212,
            ei_uhc=3.1e-8,
            nox_dry_15=2.563e-4,
            co_dry_15=6.12e-6,
            n2o_dry_15=4.5e-7,
            nox_mass_15=5.262e-4,
            co_mass_15=7.65e-6,
            nox_per_energy=2.31e-10,
            o2_dry=0.1442,
            co2_dry=0.0361,
            h2o_wet=0.0719,
            combustion_efficiency=0.99987,
            no_share=0.93,
        ),
        operability={"blowout_fuel_air_ratio": 0.0041, "blowout_margin_percent": 76.4},
        balances={"air": 1.2e-13, "elements": 3.4e-13, "enthalpy": 5.6e-11},
        findings=(
            Finding("act", "wall temperature", 1150.0, 1123.0, "K", "add 8 % film air", "target"),
            Finding("ok", "pressure loss", 4.51, 4.5, "%", "", "target"),
            Finding("watch", "CO", 6.1, None, "ppm", "mind the low load", "judgement"),
        ),
        convergence=Convergence(True, 4.1e-7, 6),
        hardware=metal(),
        cautions=("Hydrogen leaks and burns unseen.",),
    )


def blown_out() -> PointRating:
    return PointRating(
        name="idle",
        kind="idle",
        fuel="natural-gas",
        status="blown_out",
        inlet=InletRecord(5.35, 3.0e5, 423.15, 0.00634),
        fuel_flow=0.0207,
        fuel_air_ratio=0.00389,
        equivalence_ratio=0.065,
        findings=(
            Finding("watch", "CO", 6.1, None, "ppm", "mind the low load", "judgement"),
            Finding("act", "burning", None, None, "", "enrich the primary zone", "stirred reactor"),
        ),
        cautions=("Hydrogen leaks and burns unseen.",),
    )


@pytest.fixture
def ratings() -> Ratings:
    general = Finding("watch", "casing length", 1.15, 1.10, "m", "shorten dilution", "envelope")
    return Ratings("Works can", "ab" * 32, (burning(), blown_out()), True, (general,))


@pytest.fixture
def good_point() -> PointRating:
    return replace(burning(), findings=())
