"""Fields of a fuel switch study."""

from __future__ import annotations

from combustor.report.field import Field

PROPERTIES = (
    Field("fuel", "fuel"),
    Field("lower_heating_value_MJ_kg", "LHV", "lhv", "MJ/kg", 1e-6, decimals=2),
    Field("wobbe_lower_MJ_m3", "Wobbe\nlower", "wobbe_lower", "MJ/m3", 1e-6, decimals=2),
    Field("wobbe_higher_MJ_m3", "Wobbe\nhigher", "wobbe_higher", "MJ/m3", 1e-6, decimals=2),
    Field("modified_wobbe", "Wobbe by\nfuel temp.", "", "Btu/scf/R^.5", 1.0, decimals=2),
    Field("modified_wobbe_change_percent", "change", "", "%", 1.0, decimals=1),
    Field("weaver_factor", "Weaver\nspeed", "weaver", "-", 1.0, decimals=1),
    Field("stoichiometric_fuel_air_ratio", "stoich.\nfuel-air", "far", "kg/kg", 1.0, decimals=5),
    Field("stoichiometric_temperature_K", "stoich.\nflame", "flame", "K", 1.0, decimals=0),
    Field("co2_g_MJ", "CO2", "carbon_dioxide", "g/MJ", 1e9, decimals=2),
    Field("co2_cut_percent", "CO2\ncut", "", "%", 1.0, decimals=1),
    Field("sulfur_mg_kg", "sulfur", "sulfur", "mg/kg", 1e6, decimals=0),
)
SHARES = (
    Field("fuel", "fuel"),
    Field("part", "part"),
    Field("volume_percent", "volume", "volume", "%", 100.0, decimals=2),
    Field("mass_percent", "mass", "mass", "%", 100.0, decimals=2),
    Field("heat_percent", "heat\n(LHV)", "heat", "%", 100.0, decimals=2),
)
VERDICTS = (
    Field("fuel", "fuel"),
    Field("verdict", "verdict"),
    Field("reason", "for"),
)
CHANGES = (
    Field("fuel", "fuel"),
    Field("what", "change"),
    Field("amount", "by"),
    Field("note", "note"),
)
LIMITS = (
    Field("fuel", "fuel"),
    Field("point", "point"),
    Field("what", "limit"),
    Field("value", "value", "", "", 1.0, figures=4),
    Field("limit", "limit", "", "", 1.0, figures=4),
    Field("unit", "unit"),
    Field("kept", "kept"),
    Field("known", "known"),
)
POINTS = (
    Field("fuel", "fuel"),
    Field("status", "status"),
    Field("fuel_flow_kg_s", "fuel", "fuel_flow", "kg/s", 1.0, decimals=4),
    Field("volume_flow_m3_s", "volume\n15 degC", "volume_flow", "m3/s", 1.0, figures=4),
    Field("injector_pressure_ratio", "nozzle\nP ratio", "pressure_ratio", "-", 1.0, decimals=3),
    Field("choked", "choked"),
    Field("injector_area_ratio", "area for\nsame ratio", "area_ratio", "-", 1.0, decimals=3),
    Field("primary_equivalence_ratio", "primary\nequiv.", "phi", "-", 1.0, decimals=3),
    Field("primary_temperature_K", "primary\ntemp.", "primary", "K", 1.0, decimals=0),
    Field("exit_temperature_K", "exit\ntemp.", "exit", "K", 1.0, decimals=0),
    Field("nox_ppmvd_15", "NOx\n15 % O2", "nox", "ppm", 1e6, figures=3),
    Field("nox_g_MJ", "NOx\non heat", "nox_energy", "g/MJ", 1e9, figures=3),
    Field("co_ppmvd_15", "CO\n15 % O2", "co", "ppm", 1e6, figures=3),
    Field("blowout_margin_percent", "blow-out\nmargin", "margin", "%", 1.0, decimals=0),
    Field("wall_peak_K", "wall\npeak", "wall", "K", 1.0, decimals=0),
)
MORE = (
    Field("fuel", "fuel"),
    Field("pressure_loss_percent", "loss", "loss", "%", 100.0, decimals=2),
    Field(
        "largest_split_change_points", "split moved\nat most", "split", "points", 100.0, decimals=2
    ),
    Field(
        "secondary_equivalence_ratio", "secondary\nequiv.", "phi_secondary", "-", 1.0, decimals=3
    ),
    Field("efficiency_percent", "effi-\nciency", "efficiency", "%", 100.0, decimals=2),
    Field("n2o_ppmvd_15", "N2O\n15 % O2", "n2o", "ppm", 1e6, figures=2),
    Field("nh3_ppmvd_15", "NH3\n15 % O2", "nh3", "ppm", 1e6, figures=2),
    Field("h2o_percent_wet", "H2O\nwet", "water", "%", 100.0, decimals=1),
    Field("co2_kg_s", "CO2", "carbon_dioxide", "kg/s", 1.0, figures=3),
    Field("water_dew_point_degC", "water\ndew point", "dew_point", "degC", 1.0, decimals=1),
    Field("acid_dew_point_degC", "acid\ndew point", "acid_dew_point", "degC", 1.0, decimals=1),
    Field("pattern_factor", "pattern\nfactor", "pattern", "-", 1.0, decimals=3),
    Field("autoignition_margin", "auto-\nignition", "autoignition", "-", 1.0, figures=3),
    Field("flashback_core_margin", "flashback\ncore", "core", "-", 1.0, figures=3),
    Field("flashback_wall_margin", "flashback\nwall", "wall_layer", "-", 1.0, figures=3),
)
