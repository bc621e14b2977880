"""Key, label, unit and format of every value that is shown: the one place they are named."""

from __future__ import annotations

import math

from combustor.report.field import Field

_DEGREES = 180.0 / math.pi
_PPM = 1e6
_BAR_PER_PA = 1e-5

POINT = (
    Field("name", "point"),
    Field("kind", "kind"),
    Field("fuel", "fuel"),
    Field("status", "status"),
    Field("converged", "converged"),
)
INLET = (
    Field("air_flow_kg_s", "air", "inlet.air_flow", "kg/s", 1.0, decimals=3),
    Field("pressure_Pa", "pressure", "inlet.pressure", "bar", 1.0, _BAR_PER_PA, decimals=2),
    Field("temperature_K", "temper-\nature", "inlet.temperature", "K", 1.0, decimals=0),
    Field("humidity_kg_kg", "humidity", "inlet.humidity", "kg/kg", 1.0, decimals=5),
)
FUEL_AIR = (
    Field("fuel_flow_kg_s", "fuel", "fuel_flow", "kg/s", 1.0, decimals=4),
    Field("fuel_air_ratio", "fuel-air", "", "kg/kg", 1.0, decimals=5),
    Field("equivalence_ratio", "equiv.\nratio", "", "-", 1.0, decimals=3),
)
LOSS = (Field("pressure_loss_percent", "loss", "pressure_loss", "%", 100.0, decimals=2),)
LOSS_PARTS = (
    Field("diffuser", "diffuser", "pressure_loss_parts.diffuser", "%", 100.0, decimals=2),
    Field("liner", "liner", "pressure_loss_parts.liner", "%", 100.0, decimals=2),
    Field("hot", "hot", "pressure_loss_parts.hot", "%", 100.0, decimals=2),
)
EXIT = (
    Field("temperature_K", "temper-\nature", "exit.temperature", "K", 1.0, decimals=0),
    Field("pressure_Pa", "pressure", "exit.pressure", "bar", 1.0, _BAR_PER_PA, decimals=2),
    Field(
        "combustion_efficiency",
        "effi-\nciency",
        "exit.combustion_efficiency",
        "%",
        1.0,
        100.0,
        decimals=3,
    ),
    Field("pattern_factor", "pattern\nfactor", "exit.pattern_factor", "-", 1.0, decimals=3),
)
# A record of the split joins the flow, its share and the opening as metal.
SPLIT = (
    Field("name", "opening", "flow.name"),
    Field("role", "role", "flow.role"),
    Field("flow_kg_s", "air", "flow.mass_flow", "kg/s", 1.0, decimals=3),
    Field("percent", "air", "share", "%", 100.0, decimals=2),
    Field("count", "count", "opening.count", "-", decimals=0),
    Field("diameter_mm", "dia-\nmeter", "opening.diameter", "mm", 1e3, decimals=2),
    Field("effective_area_mm2", "Cd x\narea", "flow.effective_area", "mm2", 1e6, decimals=0),
    Field("discharge_coefficient", "Cd", "flow.discharge_coefficient", "-", 1.0, decimals=3),
    Field("jet_velocity_m_s", "jet", "flow.jet_velocity", "m/s", 1.0, decimals=1),
    Field("jet_angle_deg", "angle", "flow.jet_angle", "deg", _DEGREES, decimals=0),
    Field("penetration_mm", "pene-\ntration", "flow.penetration", "mm", 1e3, decimals=1),
)
ZONES = (
    Field("name", "zone"),
    Field("equivalence_ratio", "equiv.\nratio", "", "-", 1.0, decimals=3),
    Field("temperature_K", "temper-\nature", "temperature", "K", 1.0, decimals=0),
    Field("residence_time_ms", "residence\ntime", "residence_time", "ms", 1e3, decimals=2),
    Field("air_percent", "air\nso far", "air_fraction", "%", 100.0, decimals=2),
)
INJECTORS = (
    Field("name", "injector"),
    Field("fuel_percent", "fuel", "fuel_share", "%", 100.0, decimals=1),
    Field("air_kg_s", "own\nair", "own_air", "kg/s", 1.0, decimals=3),
    Field("equivalence_ratio", "equiv. ratio\nown air", "equivalence_ratio", "-", 1.0, decimals=3),
    Field(
        "primary_equivalence_ratio",
        "equiv. ratio\nprimary zone",
        "primary_equivalence_ratio",
        "-",
        1.0,
        decimals=3,
    ),
    Field("unmixedness_percent", "unmixed-\nness", "unmixedness", "%", 100.0, decimals=0),
)
PROFILE = (
    Field("x_mm", "x", "station", "mm", 1e3, decimals=1),
    Field("temperature_K", "temper-\nature", "temperature", "K", 1.0, decimals=0),
    Field("nox_ppmvd_15", "NOx", "nox", "ppm", _PPM, figures=3),
    Field("co_ppmvd_15", "CO", "co", "ppm", _PPM, figures=3),
)
WALLS = (
    Field("x_mm", "x", "station", "mm", 1e3, decimals=1),
    Field("side", "side"),
    Field("temperature_K", "metal\nhot side", "temperature", "K", 1.0, decimals=0),
    Field("film_effectiveness", "film\neffect.", "", "-", 1.0, decimals=3),
    Field(
        "cold_side_temperature_K", "metal\ncold side", "cold_side_temperature", "K", 1.0, decimals=0
    ),
    Field("radiation_kW_m2", "radiation\nin", "radiation", "kW/m2", 1e-3, decimals=1),
    Field("convection_kW_m2", "convection\nin", "convection", "kW/m2", 1e-3, decimals=1),
)
EMISSIONS = (
    Field("ei_nox_g_kg", "NOx", "ei_nox", "g/kg fuel", 1e3, figures=3),
    Field("ei_co_g_kg", "CO", "ei_co", "g/kg fuel", 1e3, figures=3),
    Field("ei_uhc_g_kg", "UHC", "ei_uhc", "g/kg fuel", 1e3, figures=3),
    Field("nox_ppmvd_15", "NOx", "nox_dry_15", "ppm", _PPM, figures=3),
    Field("co_ppmvd_15", "CO", "co_dry_15", "ppm", _PPM, figures=3),
    Field("n2o_ppmvd_15", "N2O", "n2o_dry_15", "ppm", _PPM, figures=3),
    Field("nox_mg_nm3_15", "NOx", "nox_mass_15", "mg/Nm3", 1e6, figures=3),
    Field("co_mg_nm3_15", "CO", "co_mass_15", "mg/Nm3", 1e6, figures=3),
    Field("nox_g_MJ", "NOx", "nox_per_energy", "g/MJ LHV", 1e9, figures=3),
    Field("o2_percent_dry", "O2 dry", "o2_dry", "%", 100.0, decimals=2),
    Field("co2_percent_dry", "CO2 dry", "co2_dry", "%", 100.0, decimals=2),
    Field("h2o_percent_wet", "H2O wet", "h2o_wet", "%", 100.0, decimals=2),
    Field("nh3_ppmvd_15", "NH3", "nh3_dry_15", "ppm", _PPM, figures=3),
    Field("no_share_of_nox_percent", "NO in NOx", "no_share", "%", 100.0, decimals=1),
)
BALANCES = (
    Field("air", "air", "", "of inlet air", 1.0, figures=2),
    Field("elements", "elements", "", "", 1.0, figures=2),
    Field("enthalpy", "enthalpy", "", "of fuel heat", 1.0, figures=2),
)
OPERABILITY = (
    Field("blowout_fuel_air_ratio", "blow-out fuel-air ratio", "", "kg/kg", 1.0, figures=3),
    Field("blowout_margin_percent", "blow-out margin", "", "%", 1.0, decimals=1),
    Field(
        "blowout_primary_equivalence_ratio",
        "blow-out equivalence ratio, primary zone",
        "",
        "-",
        1.0,
        figures=3,
    ),
    Field(
        "blowout_fuel_air_ratio_correlation",
        "blow-out fuel-air ratio, Lefebvre 1985",
        "",
        "kg/kg",
        1.0,
        figures=2,
    ),
    Field(
        "rich_limit_primary_equivalence_ratio",
        "rich limit, mixed primary zone",
        "",
        "-",
        1.0,
        figures=3,
    ),
    Field(
        "residence_time_over_blowout",
        "residence time over blow-out, mixed",
        "",
        "-",
        1.0,
        figures=3,
    ),
    Field("ignition_loading_1e6", "loading at light-up", "", "1e6", 1.0, figures=3),
    Field(
        "light_off_fuel_air_ratio_correlation",
        "light-off fuel-air ratio, Lefebvre 1985",
        "",
        "kg/kg",
        1.0,
        figures=2,
    ),
    Field("efficiency_loss_co_percent", "efficiency lost as CO", "", "%", 1.0, figures=2),
    Field(
        "efficiency_loss_unburnt_percent",
        "efficiency lost as other unburnt",
        "",
        "%",
        1.0,
        figures=2,
    ),
    Field(
        "efficiency_loss_evaporation_percent",
        "efficiency lost as liquid",
        "",
        "%",
        1.0,
        figures=2,
    ),
    Field("premixer_time_ms", "time in the premixer", "", "ms", 1.0, figures=3),
    Field("autoignition_delay_ms", "ignition delay, the shorter", "", "ms", 1.0, figures=3),
    Field("autoignition_margin", "ignition delay over what is asked", "", "-", 1.0, figures=3),
    Field("burning_velocity_m_s", "laminar burning velocity", "", "m/s", 1.0, figures=3),
    Field("flashback_core_margin", "core velocity over what is asked", "", "-", 1.0, figures=3),
    Field("flashback_wall_margin", "wall gradient over what is asked", "", "-", 1.0, figures=3),
    Field("convective_time_lag_ms", "time lag injector to flame", "", "ms", 1.0, figures=3),
)
FINDINGS = (
    Field("level", "verdict"),
    Field("what", "what"),
    Field("value", "value", "", "", 1.0, figures=4),
    Field("limit", "limit", "", "", 1.0, figures=4),
    Field("unit", "unit"),
    Field("advice", "advice"),
    Field("source", "source"),
)
DIMENSIONS = (
    Field("name", "dimension"),
    Field("value", "value", figures=4),
    Field("unit", "unit"),
    Field("method", "method"),
    Field("source", "source"),
    Field("reading", "where it was read"),
    Field("note", "note"),
    Field("candidate_value", "rival", figures=4),
    Field("candidate_method", "rival method"),
    Field("candidate_source", "rival source"),
    Field("candidate_reason", "why it lost"),
)
ZONE_TARGETS = (
    Field("name", "zone"),
    Field("wanted", "equiv. ratio\nwanted", "", "-", 1.0, decimals=3),
    Field("reached", "equiv. ratio\nreached", "", "-", 1.0, decimals=3),
)
FUEL = (
    Field("name", "fuel"),
    Field("phase", "phase"),
    Field("molar_mass_g_mol", "molar\nmass", "molar_mass", "g/mol", 1e3, decimals=3),
    Field("lower_heating_value_MJ_kg", "LHV", "lower_heating_value", "MJ/kg", 1e-6, decimals=3),
    Field("higher_heating_value_MJ_kg", "HHV", "higher_heating_value", "MJ/kg", 1e-6, decimals=3),
    Field(
        "stoichiometric_fuel_air_ratio",
        "stoich.\nfuel-air",
        "",
        "kg/kg dry",
        1.0,
        decimals=5,
    ),
    Field("wobbe_lower_MJ_m3", "Wobbe\nlower", "wobbe_lower", "MJ/m3", 1e-6, decimals=3),
    Field("wobbe_higher_MJ_m3", "Wobbe\nhigher", "wobbe_higher", "MJ/m3", 1e-6, decimals=3),
    Field("density_15_kg_m3", "density", "density_15", "kg/m3", 1.0, decimals=4),
)
FLAME = (
    Field("fuel", "fuel"),
    Field("equivalence_ratio", "equivalence ratio", "", "", 1.0, decimals=4),
    Field("fuel_air_ratio", "fuel-air ratio", "", "kg/kg dry air", 1.0, decimals=5),
    Field("temperature_K", "temperature", "temperature", "K", 1.0, decimals=1),
    Field("fuel_temperature_K", "fuel temperature", "fuel_temperature", "K", 1.0, decimals=1),
    Field("mixture_temperature_K", "unburnt", "mixture_temperature", "K", 1.0, decimals=1),
    Field("pressure_Pa", "pressure", "pressure", "bar", 1.0, _BAR_PER_PA, decimals=3),
    Field("humidity_kg_kg", "humidity", "humidity", "kg/kg dry air", 1.0, decimals=5),
    Field("residence_time_ms", "residence time", "residence_time", "ms", 1e3, figures=3),
)
FLAME_TEMPERATURE = Field("temperature_K", "temper-\nature", "temperature", "K", 1.0, decimals=0)

# Kind of a sized dimension: how its value is named, scaled and printed.
UNIT_KINDS: dict[str, Field] = {
    "length": Field("value", "value", "", "mm", 1e3, decimals=2),
    "area": Field("value", "value", "", "mm2", 1e6, decimals=0),
    "angle": Field("value", "value", "", "deg", _DEGREES, decimals=1),
    "count": Field("value", "value", "", "-", 1.0, decimals=0),
    "fraction": Field("value", "value", "", "%", 100.0, decimals=2),
    "ratio": Field("value", "value", "", "-", 1.0, decimals=3),
    "velocity": Field("value", "value", "", "m/s", 1.0, decimals=1),
    "temperature": Field("value", "value", "", "K", 1.0, decimals=0),
    "mass_flow": Field("value", "value", "", "kg/s", 1.0, decimals=4),
}
