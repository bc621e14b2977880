"""Fields of the compliance pre-check, of conversions and of the catalogue of rules."""

from __future__ import annotations

from combustor.report.field import Field

VERDICTS = (
    Field("point", "point"),
    Field("rule", "rule set"),
    Field("row", "row"),
    Field("pollutant", "pollutant"),
    Field("predicted", "predic-\nted", "", "", 1.0, figures=3),
    Field("predicted_rounded", "rounded", "", "", 1.0),
    Field("band_low", "band\nlow", "", "5 %", 1.0, figures=3),
    Field("band_high", "band\nhigh", "", "95 %", 1.0, figures=3),
    Field("limit", "limit", "", "", 1.0, figures=3),
    Field("unit", "unit"),
    Field("margin", "margin", "", "", 1.0, figures=3),
    Field("margin_percent", "margin", "", "%", 1.0, decimals=0),
    Field("probability_of_exceeding", "proba-\nbility", "", "over", 1.0, decimals=2),
    Field("verdict", "verdict"),
    Field("limit_status", "limit was"),
    Field("reason", "reason"),
    Field("choice", "option of"),
    Field("would_be", "would be"),
    Field("averaging", "averaging"),
    Field("beside", "beside"),
)
STANDINGS = (
    Field("rule", "rule set"),
    Field("row", "row"),
    Field("points", "points"),
    Field("binds", "binds"),
    Field("why", "why"),
)
GAPS = (
    Field("pollutant", "pollutant"),
    Field("point", "point"),
    Field("rule", "rule set"),
    Field("row", "row"),
    Field("factor", "down to", "", "of predicted", 1.0, decimals=2),
    Field("what", "lever"),
    Field("change", "roughly"),
    Field("note", "note"),
)
CONCENTRATIONS = (
    Field("point", "point"),
    Field("pollutant", "pollutant"),
    Field("ppmvw", "as found\nwet", "", "ppm", 1.0, figures=3),
    Field("ppmvd", "as found\ndry", "", "ppm", 1.0, figures=3),
    Field("ppmvd_15", "15 % O2\ndry", "", "ppm", 1.0, figures=3),
    Field("mg_nm3_15", "15 % O2\n0 degC", "", "mg/m3", 1.0, figures=3),
    Field("mg_m3_15C_15", "15 % O2\n15 degC", "", "mg/m3", 1.0, figures=3),
    Field("mg_m3_20C_15", "15 % O2\n20 degC", "", "mg/m3", 1.0, figures=3),
)
MASSES = (
    Field("point", "point"),
    Field("pollutant", "pollutant"),
    Field("ei_g_kg", "per\nfuel", "", "g/kg", 1.0, figures=3),
    Field("g_MJ_LHV", "per heat\nLHV", "", "g/MJ", 1.0, figures=3),
    Field("ng_J_HHV", "per heat\nHHV", "", "ng/J", 1.0, figures=3),
    Field("lb_MMBtu_HHV", "per heat\nHHV", "", "lb/MMBtu", 1.0, figures=3),
    Field("lb_MMBtu_HHV_default", "default\nFd", "", "lb/MMBtu", 1.0, figures=3),
    Field("g_kWh", "per\noutput", "", "g/kWh", 1.0, figures=3),
    Field("lb_MWh", "per\noutput", "", "lb/MWh", 1.0, figures=3),
    Field("kg_h", "rate", "", "kg/h", 1.0, figures=3),
    Field("t_yr", "a year", "", "t/yr", 1.0, figures=3),
)
DEW_POINTS = (
    Field("point", "point"),
    Field("h2o_percent_wet", "H2O wet", "", "%", 1.0, decimals=2),
    Field("water_dew_point_degC", "water\ndew point", "", "degC", 1.0, decimals=1),
    Field("so2_ppmvd_15", "SO2", "", "ppmvd@15", 1.0, figures=3),
    Field("so3_ppmvd_15", "SO3", "", "ppmvd@15", 1.0, figures=3),
    Field("acid_dew_point_degC", "acid\ndew point", "", "degC", 1.0, decimals=1),
)
SMOKE = (
    Field("point", "point"),
    Field("relative_soot", "relative\nsoot", "", "-", 1.0, figures=2),
)
FUEL_FACTORS = (
    Field("factor", "factor"),
    Field("dry", "dry Fd", "", "dscf/MMBtu", 1.0, decimals=0),
    Field("wet", "wet Fw", "", "wscf/MMBtu", 1.0, decimals=0),
    Field("carbon_dioxide", "CO2 Fc", "", "scf/MMBtu", 1.0, decimals=0),
    Field("dry_si", "dry Fd", "", "m3/J", 1.0, figures=4),
    Field("wet_si", "wet Fw", "", "m3/J", 1.0, figures=4),
    Field("carbon_dioxide_si", "CO2 Fc", "", "m3/J", 1.0, figures=4),
)
STEPS = (
    Field("run", "run"),
    Field("what", "step"),
    Field("value", "value", "", "", 1.0, figures=5),
    Field("unit", "unit"),
)
RESULTS = (
    Field("unit", "unit"),
    Field("value", "value", "", "", 1.0, figures=4),
    Field("note", "rests on"),
)
RULE_SETS = (
    Field("name", "rule set"),
    Field("title", "title", "table.title"),
    Field("jurisdiction", "where", "table.jurisdiction"),
    Field("rows", "rows", "", "", decimals=0),
    Field("memory", "not\nverified", "", "", decimals=0),
    Field("review", "review by"),
)
RULE_ROWS = (
    Field("row", "row"),
    Field("pollutant", "pollutant"),
    Field("limit", "limit"),
    Field("unit", "unit"),
    Field("when", "binds when"),
    Field("reading", "figure"),
    Field("averaging", "averaging"),
    Field("read_in", "read in"),
    Field("note", "note"),
)
