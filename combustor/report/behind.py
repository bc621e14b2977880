"""Which methods stand behind each value of a rating's tables, by table and key of the value."""

from __future__ import annotations

from collections.abc import Mapping

_AIR = ("orifice-compressible", "diffuser-loss", "dump-loss", "annulus-recovery", "annulus-turning")
_HOLES = (
    "discharge-coefficient-kaddah",
    "discharge-coefficient-default",
    "discharge-coefficient-kirchhoff",
    "swirler-knight-walker",
)
_FRICTION = ("friction-haaland", "viscosity-sutherland", "liner-momentum")
_FLOW = (*_AIR, *_HOLES, *_FRICTION)
_STREAMS = (
    "unmixed-streams",
    "streams-by-square-root",
    "unmixedness-default",
    "unmixedness-premixed",
    "recirculation-default",
    "recirculation-to-streams",
    "jet-mixing-length",
    "mixing-default",
    "exchange-with-the-mean",
    "near-wall-stream",
    "film-mixing",
)
_FUEL = (
    "stoichiometric-fuel-air-ratio",
    "dry-air-composition",
    "fuel-for-exit-temperature",
    "heating-value-iso-6976",
    "heating-value-mechanism",
)
_RATIO = ("primary-jet-share", "film-mixing", "stoichiometric-fuel-air-ratio")
_FILM = (
    "slot-effectiveness-ballal-lefebvre",
    "slot-effectiveness-mixing-juhasz-marek",
    "film-decay-far",
    "film-regime-join",
    "film-superposition-sellers",
)
_RADIATION = (
    "gas-wall-radiation-lefebvre-herbert",
    "grey-gas-smith",
    "pressure-broadening-leckner",
    "luminous-emissivity-lefebvre",
    "luminosity-hydrogen-lefebvre",
    "beam-length-lefebvre",
)
_CONVECTION = (
    "duct-convection-lefebvre-herbert",
    "film-convection-lefebvre",
    "combustion-gas-transport-fit",
)
_WALL = (
    "wall-balance-lefebvre-herbert",
    "sheet-conduction",
    "grey-enclosure",
    "casing-balance",
    *_RADIATION,
    *_CONVECTION,
    *_FILM,
    "effusion-rows-sellers",
    "effusion-hole-convection",
)
_BASIS = ("oxygen-correction",)

BEHIND: Mapping[str, tuple[str, ...]] = {
    "point.fuel_flow_kg_s": _FUEL,
    "point.fuel_air_ratio": _FUEL,
    "point.equivalence_ratio": _FUEL,
    "point.pressure_loss_percent": (*_FLOW, "hot-loss"),
    "point.diffuser": ("diffuser-loss", "dump-loss", "borda-carnot"),
    "point.liner": _FLOW,
    "point.hot": ("hot-loss", "rayleigh"),
    "exit.temperature_K": (*_FUEL, *_STREAMS),
    "exit.pressure_Pa": (*_FLOW, "hot-loss"),
    "exit.combustion_efficiency": ("combustion-efficiency-loss", *_STREAMS),
    "exit.pattern_factor": ("pattern-factor-law",),
    "split.flow_kg_s": _FLOW,
    "split.percent": _FLOW,
    "split.effective_area_mm2": _HOLES,
    "split.discharge_coefficient": _HOLES,
    "split.jet_velocity_m_s": ("orifice-compressible", *_HOLES),
    "split.jet_angle_deg": ("jet-angle-lefebvre",),
    "split.penetration_mm": ("penetration-can-row", "penetration-norster"),
    "zones.equivalence_ratio": _RATIO,
    "zones.air_percent": _RATIO,
    "zones.temperature_K": _STREAMS,
    "zones.residence_time_ms": _STREAMS,
    "injectors.equivalence_ratio": ("injector-air", "stoichiometric-fuel-air-ratio"),
    "injectors.primary_equivalence_ratio": ("injector-air", *_RATIO),
    "injectors.unmixedness_percent": ("unmixedness-default", "unmixedness-premixed"),
    "profile.temperature_K": _STREAMS,
    "profile.nox_ppmvd_15": (*_STREAMS, *_BASIS),
    "profile.co_ppmvd_15": (*_STREAMS, *_BASIS),
    "walls.temperature_K": _WALL,
    "walls.film_effectiveness": _FILM,
    "walls.cold_side_temperature_K": _WALL,
    "walls.radiation_kW_m2": _RADIATION,
    "walls.convection_kW_m2": (*_CONVECTION, *_FILM),
    "emissions.ei_nox_g_kg": _STREAMS,
    "emissions.ei_co_g_kg": _STREAMS,
    "emissions.ei_uhc_g_kg": _STREAMS,
    "emissions.nox_ppmvd_15": (*_STREAMS, *_BASIS),
    "emissions.co_ppmvd_15": (*_STREAMS, *_BASIS),
    "emissions.n2o_ppmvd_15": (*_STREAMS, *_BASIS),
    "emissions.nh3_ppmvd_15": (*_STREAMS, *_BASIS),
    "emissions.nox_mg_nm3_15": (*_STREAMS, *_BASIS, "emission-unit-factors"),
    "emissions.co_mg_nm3_15": (*_STREAMS, *_BASIS, "emission-unit-factors"),
    "emissions.nox_g_MJ": (*_STREAMS, "heating-value-iso-6976", "heating-value-mechanism"),
    "emissions.no_share_of_nox_percent": _STREAMS,
    "emissions.o2_percent_dry": _FUEL,
    "emissions.co2_percent_dry": _FUEL,
    "emissions.h2o_percent_wet": _FUEL,
    "operability.blowout_fuel_air_ratio": ("blowout-margin", *_STREAMS),
    "operability.blowout_margin_percent": ("blowout-margin", *_STREAMS),
    "operability.blowout_primary_equivalence_ratio": ("blowout-margin", *_STREAMS),
    "operability.blowout_fuel_air_ratio_correlation": ("lean-blowout-lefebvre",),
    "operability.rich_limit_primary_equivalence_ratio": ("blowout-margin", *_STREAMS),
    "operability.residence_time_over_blowout": ("stirred-blowout", *_STREAMS),
    "operability.ignition_loading_1e6": ("ignition-loading",),
    "operability.light_off_fuel_air_ratio_correlation": ("lean-light-off-lefebvre",),
    "operability.efficiency_loss_co_percent": ("combustion-efficiency-loss", *_STREAMS),
    "operability.efficiency_loss_unburnt_percent": ("combustion-efficiency-loss", *_STREAMS),
    "operability.efficiency_loss_evaporation_percent": (
        "combustion-efficiency-loss",
        "evaporation-d-squared",
        "evaporation-effective",
    ),
    "operability.premixer_time_ms": ("orifice-compressible", *_HOLES),
    "operability.autoignition_delay_ms": (
        "ignition-delay-jet-a",
        "ignition-delay-diesel",
        "ignition-delay-natural-gas",
        "ignition-delay-methane",
        "ignition-delay-kinetic",
    ),
    "operability.autoignition_margin": ("autoignition-safety-factor",),
    "operability.burning_velocity_m_s": (
        "burning-velocity-gulder",
        "burning-velocity-kinetic",
        "burning-velocity-table",
    ),
    "operability.flashback_core_margin": (
        "turbulent-burning-velocity-zimont",
        "turbulent-burning-velocity-damkoehler",
        "flashback-safety-factors",
    ),
    "operability.flashback_wall_margin": (
        "wall-velocity-gradient",
        "critical-gradient-flashback",
        "flashback-safety-factors",
    ),
    "operability.convective_time_lag_ms": ("convective-time-lag",),
    "near_wall.co_beside_wall_percent": ("near-wall-stream", *_FILM),
    "near_wall.co_quenched_at_wall_ppmvd_15": ("near-wall-stream", *_FILM, *_BASIS),
}

# What comes from the reactions themselves stands on the mechanism burnt, whatever its name.
FROM_REACTIONS = (
    "exit.temperature_K",
    "exit.combustion_efficiency",
    "zones.temperature_K",
    "profile.",
    "emissions.",
    "near_wall.",
    "operability.blowout_fuel_air_ratio",
    "operability.blowout_margin_percent",
    "operability.rich_limit",
    "operability.residence_time",
    "operability.efficiency",
)
