"""Every kind of quantity a case file holds, with its plausible window.

A window keeps out what cannot be a combustor (a slipped decimal, a wrong unit), not what is
unusual: recuperated, reheat and micro machines lie inside. All windows are judgement.
"""

from __future__ import annotations

import datetime
import math
from typing import Annotated

from pydantic import BeforeValidator

from combustor.case.quantity import Quantity, calendar_day, whole, word

DEG = math.pi / 180.0


def _length(name: str, low: float, high: float, example: str, window: str) -> Quantity:
    return Quantity(name, "length", low, high, example, window)


def _fraction(name: str, low: float, high: float, example: str, window: str) -> Quantity:
    return Quantity(name, "ratio", low, high, example, window, bare="fraction")


AIR_FLOW = Quantity("air flow", "mass flow", 1e-4, 3e3, '"14.2 kg/s"', "0.0001 to 3000 kg/s")
FUEL_FLOW = Quantity("fuel flow", "mass flow", 1e-7, 300.0, '"0.24 kg/s"', "1e-7 to 300 kg/s")
WATER_FLOW = Quantity("water flow", "mass flow", 0.0, 300.0, '"0.1 kg/s"', "0 to 300 kg/s")
FUEL_AIR_RATIO = Quantity("fuel-air ratio", "ratio", 1e-5, 10.0, "0.0173", "1e-5 to 10")
INLET_PRESSURE = Quantity(
    "inlet pressure", "pressure", 1e3, 1e7, '"9.8 bar"', "1 kPa to 100 bar, total and absolute"
)
SUPPLY_PRESSURE = Quantity(
    "supply pressure", "pressure", 1e4, 1e8, '"18 bar"', "0.1 to 1000 bar, absolute"
)
AMBIENT_PRESSURE = Quantity(
    "ambient pressure", "pressure", 1e3, 1.2e5, '"101.3 kPa"', "1 to 120 kPa, absolute"
)
INLET_TEMPERATURE = Quantity(
    "inlet temperature", "temperature", 150.0, 1500.0, '"325 degC"', "150 to 1500 K"
)
EXIT_TEMPERATURE = Quantity(
    "exit temperature", "temperature", 250.0, 3000.0, '"1000 degC"', "250 to 3000 K"
)
FUEL_TEMPERATURE = Quantity(
    "fuel temperature", "temperature", 15.0, 1200.0, '"15 degC"', "15 to 1200 K"
)
AMBIENT_TEMPERATURE = Quantity(
    "ambient temperature", "temperature", 180.0, 340.0, '"15 degC"', "180 to 340 K"
)
ALTITUDE = Quantity("altitude", "length", -500.0, 2e4, '"9000 m"', "-500 to 20000 m, geopotential")
FLIGHT_MACH = Quantity("flight Mach number", "ratio", 0.0, 3.0, "0.8", "0 to 3")
RAM_RECOVERY = Quantity("ram recovery", "ratio", -0.5, 1.0, '0.95 or "95 %"', "-50 to 100 %")
WALL_TEMPERATURE = Quantity(
    "wall temperature", "temperature", 500.0, 1900.0, '"850 degC"', "500 to 1900 K"
)
HUMIDITY = Quantity(
    "humidity", "ratio", 0.0, 0.2, '0.00634 or "6.34 g/kg"', "0 to 0.2 kg water per kg dry air"
)
LOAD = Quantity("load", "ratio", 0.0, 150.0, '"80 %"', "0 to 150 %", bare="percent")
OUTPUT = Quantity("output", "power", 0.0, 2e9, '"3.0 MW"', "0 to 2000 MW")
HEAT_INPUT = Quantity("heat input", "power", 1.0, 5e9, '"11.7 MW"', "1 W to 5000 MW")
THRUST = Quantity("rated thrust", "force", 1.0, 1e6, '"26.7 kN"', "1 N to 1000 kN")

ENVELOPE = _length("envelope dimension", 1e-2, 30.0, '"440 mm"', "10 mm to 30 m")
DUCT_LENGTH = _length("duct length", 0.0, 30.0, '"250 mm"', "0 to 30 m")
INNER_DIAMETER = _length("inner diameter", 0.0, 30.0, '"403 mm"', "0 to 30 m")
DIAMETER = _length("diameter", 1e-4, 30.0, '"390 mm"', "0.1 mm to 30 m")
HUB_DIAMETER = _length("hub diameter", 0.0, 5.0, '"40 mm"', "0 to 5 m")
HOLE = _length("hole diameter", 5e-5, 1.0, '"9.5 mm"', "0.05 mm to 1 m")
STATION = _length("axial position", -1.0, 30.0, '"120 mm"', "-1 to 30 m from the dome face")
THICKNESS = _length("thickness", 5e-5, 0.1, '"1.2 mm"', "0.05 to 100 mm")
COATING = _length("coating thickness", 0.0, 5e-3, '"0.3 mm"', "0 to 5 mm")
SLOT_HEIGHT = _length("slot height", 1e-4, 0.1, '"2 mm"', "0.1 to 100 mm")
PITCH = _length("slot pitch", 2e-3, 2.0, '"40 mm"', "2 mm to 2 m")
DRILL_STEP = _length("drill step", 1e-6, 5e-3, '"0.1 mm"', "0.001 to 5 mm")
ROUGHNESS = _length("roughness", 0.0, 1e-3, '"1.5 um"', "0 to 1 mm")
LENGTH = _length("length", 1e-4, 100.0, '"300 mm"', "0.1 mm to 100 m")
AREA = Quantity("area", "area", 1e-10, 1e3, '"450 mm2"', "1e-4 mm2 to 1000 m2")
EFFECTIVE_AREA = Quantity("effective area", "area", 1e-10, 100.0, '"450 mm2"', "up to 100 m2")

PRESSURE_LOSS = _fraction("pressure loss", 1e-4, 0.5, '"4.5 %" or 0.045', "0.01 to 50 %")
FRACTION = _fraction("fraction", 0.0, 1.0, '"5 %" or 0.05', "0 to 100 %")
SHARE = _fraction("share", 0.0, 1.0, '"50 %" or 0.5', "0 to 100 %")
AREA_RATIO = _fraction("area ratio", 0.05, 0.98, '0.7 or "70 %"', "5 to 98 %")
PATTERN_FACTOR = _fraction("pattern factor", 1e-3, 1.0, '0.15 or "15 %"', "0.1 to 100 %")
CONCENTRATION = _fraction("concentration", 0.0, 0.1, '"25 ppm"', "0 to 10 %, dry at 15 % O2")
EMISSIVITY = _fraction("emissivity", 1e-3, 1.0, "0.8", "0.001 to 1")
MOLE_FRACTION = _fraction("mole fraction", 0.0, 1.0, '"92 %" or 0.92', "0 to 100 %")
UNMIXEDNESS = _fraction("unmixedness", 0.0, 1.0, '0.4 or "40 %"', "0 to 100 %")
EQUIVALENCE_RATIO = Quantity("equivalence ratio", "ratio", 0.05, 5.0, "0.95", "0.05 to 5")
RECIRCULATION = Quantity("recirculation", "ratio", 0.0, 20.0, "0.5", "0 to 20 kg per kg fresh")
RESIDENCE_TIME = Quantity("residence time", "time", 1e-5, 0.1, '"1 ms"', "0.01 to 100 ms")
MIXING = Quantity("mixing rate", "rate", 0.0, 1e6, '"300 1/s"', "0 to 1e6 1/s")
COEFFICIENT = Quantity("discharge coefficient", "ratio", 0.01, 1.2, "0.62", "0.01 to 1.2")
LOSS_COEFFICIENT = Quantity("loss coefficient", "ratio", 0.0, 10.0, "0.4", "0 to 10")
CASING_RATIO = Quantity("casing area ratio", "ratio", 0.01, 10.0, "0.9", "0.01 to 10")
ANNULUS_VELOCITY = Quantity("annulus velocity", "velocity", 1.0, 250.0, '"45 m/s"', "1 to 250 m/s")
VANE_ANGLE = Quantity("vane angle", "angle", 0.0, 85 * DEG, '"45 deg"', "0 to 85 deg")
CASING_LOSS = Quantity(
    "heat transfer coefficient", "heat transfer", 0.0, 1e3, '"8 W/m2/K"', "0 to 1000 W/m2/K"
)
CONDUCTIVITY = Quantity("conductivity", "conductivity", 1e-2, 500.0, '"26 W/m/K"', "0.01 to 500")

HEATING_VALUE = Quantity(
    "net heating value", "specific energy", 1e6, 6e7, '"43.1 MJ/kg"', "1 to 60 MJ/kg"
)
LATENT_HEAT = Quantity(
    "latent heat", "specific energy", 1e5, 1.5e6, '"0.32 MJ/kg"', "0.1 to 1.5 MJ/kg"
)
LIQUID_HEAT = Quantity(
    "heat capacity", "specific heat", 1e3, 4e3, '"2.0 kJ/kg/K"', "1 to 4 kJ/kg/K"
)
LIQUID_DENSITY = Quantity("density", "density", 500.0, 1100.0, '"804 kg/m3"', "500 to 1100 kg/m3")
MOLAR_MASS = Quantity("molar mass", "molar mass", 0.03, 0.5, '"159 g/mol"', "30 to 500 g/mol")
BOILING_POINT = Quantity(
    "mid-boiling point", "temperature", 300.0, 700.0, '"210 degC"', "300 to 700 K"
)
MASS_FRACTION = _fraction("mass fraction", 0.0, 1.0, '"13.8 %" or 0.138', "0 to 100 %")
VOLUME_FRACTION = _fraction("volume fraction", 0.0, 1.0, '"18 %" or 0.18', "0 to 100 %")
HYDROGEN_CARBON = Quantity("H/C ratio", "ratio", 0.3, 4.2, "1.91", "0.3 to 4.2 atoms per atom")
VISCOSITY = Quantity("viscosity", "viscosity", 1e-4, 2e-2, '"1.3 mPa.s"', "0.1 to 20 mPa.s")
SURFACE_TENSION = Quantity(
    "surface tension", "surface tension", 1e-2, 8e-2, '"25 mN/m"', "10 to 80 mN/m"
)
DROP_SIZE = _length("drop size", 1e-6, 1e-3, '"45 um"', "1 to 1000 um")
FLOW_NUMBER = Quantity("flow number", "area", 1e-10, 1e-3, '"0.5 mm2"', "1e-4 to 1000 mm2")
SPRAY_ANGLE = Quantity("spray cone angle", "angle", 0.0, 170 * DEG, '"90 deg"', "0 to 170 deg")
SPREAD = Quantity("Rosin-Rammler exponent", "ratio", 1.5, 8.0, "3", "1.5 to 8")
AIR_LIQUID_RATIO = Quantity("air-liquid ratio", "ratio", 0.05, 100.0, "4", "0.05 to 100")
AIR_VELOCITY = Quantity("air velocity", "velocity", 1.0, 400.0, '"100 m/s"', "1 to 400 m/s")
EVAPORATION = Quantity(
    "evaporation constant", "evaporation constant", 1e-9, 1e-5, '"0.8 mm2/s"', "0.001 to 10 mm2/s"
)

HOURS_A_YEAR = Quantity("hours a year", "ratio", 0.0, 8784.0, "1500", "0 to 8784 h")
EFFICIENCY = _fraction("efficiency", 0.01, 1.0, '"38 %"', "1 to 100 %")
FUEL_SHARE = _fraction("share of the fuel's mass", 0.0, 0.2, '"50 ppm"', "0 to 20 %")
OVERALL_PRESSURE_RATIO = Quantity("overall pressure ratio", "ratio", 1.0, 200.0, "30", "1 to 200")
SCATTER = Quantity("scatter", "ratio", 0.01, 3.0, "0.35", "0.01 to 3, of the logarithm")

AirFlow = Annotated[float, BeforeValidator(AIR_FLOW.validate)]
FuelFlow = Annotated[float, BeforeValidator(FUEL_FLOW.validate)]
WaterFlow = Annotated[float, BeforeValidator(WATER_FLOW.validate)]
FuelAirRatio = Annotated[float, BeforeValidator(FUEL_AIR_RATIO.validate)]
InletPressure = Annotated[float, BeforeValidator(INLET_PRESSURE.validate)]
SupplyPressure = Annotated[float, BeforeValidator(SUPPLY_PRESSURE.validate)]
AmbientPressure = Annotated[float, BeforeValidator(AMBIENT_PRESSURE.validate)]
InletTemperature = Annotated[float, BeforeValidator(INLET_TEMPERATURE.validate)]
ExitTemperature = Annotated[float, BeforeValidator(EXIT_TEMPERATURE.validate)]
FuelTemperature = Annotated[float, BeforeValidator(FUEL_TEMPERATURE.validate)]
AmbientTemperature = Annotated[float, BeforeValidator(AMBIENT_TEMPERATURE.validate)]
Altitude = Annotated[float, BeforeValidator(ALTITUDE.validate)]
FlightMach = Annotated[float, BeforeValidator(FLIGHT_MACH.validate)]
RamRecovery = Annotated[float, BeforeValidator(RAM_RECOVERY.validate)]
WallTemperature = Annotated[float, BeforeValidator(WALL_TEMPERATURE.validate)]
Humidity = Annotated[float, BeforeValidator(HUMIDITY.validate)]
Load = Annotated[float, BeforeValidator(LOAD.validate)]
Output = Annotated[float, BeforeValidator(OUTPUT.validate)]
HeatInput = Annotated[float, BeforeValidator(HEAT_INPUT.validate)]
Thrust = Annotated[float, BeforeValidator(THRUST.validate)]
Envelope = Annotated[float, BeforeValidator(ENVELOPE.validate)]
DuctLength = Annotated[float, BeforeValidator(DUCT_LENGTH.validate)]
InnerDiameter = Annotated[float, BeforeValidator(INNER_DIAMETER.validate)]
Diameter = Annotated[float, BeforeValidator(DIAMETER.validate)]
HubDiameter = Annotated[float, BeforeValidator(HUB_DIAMETER.validate)]
HoleDiameter = Annotated[float, BeforeValidator(HOLE.validate)]
Station = Annotated[float, BeforeValidator(STATION.validate)]
Thickness = Annotated[float, BeforeValidator(THICKNESS.validate)]
CoatingThickness = Annotated[float, BeforeValidator(COATING.validate)]
SlotHeight = Annotated[float, BeforeValidator(SLOT_HEIGHT.validate)]
Pitch = Annotated[float, BeforeValidator(PITCH.validate)]
DrillStep = Annotated[float, BeforeValidator(DRILL_STEP.validate)]
Roughness = Annotated[float, BeforeValidator(ROUGHNESS.validate)]
Length = Annotated[float, BeforeValidator(LENGTH.validate)]
Area = Annotated[float, BeforeValidator(AREA.validate)]
EffectiveArea = Annotated[float, BeforeValidator(EFFECTIVE_AREA.validate)]
PressureLoss = Annotated[float, BeforeValidator(PRESSURE_LOSS.validate)]
Fraction = Annotated[float, BeforeValidator(FRACTION.validate)]
Share = Annotated[float, BeforeValidator(SHARE.validate)]
AreaRatio = Annotated[float, BeforeValidator(AREA_RATIO.validate)]
PatternFactor = Annotated[float, BeforeValidator(PATTERN_FACTOR.validate)]
Concentration = Annotated[float, BeforeValidator(CONCENTRATION.validate)]
Emissivity = Annotated[float, BeforeValidator(EMISSIVITY.validate)]
MoleFraction = Annotated[float, BeforeValidator(MOLE_FRACTION.validate)]
Unmixedness = Annotated[float, BeforeValidator(UNMIXEDNESS.validate)]
EquivalenceRatio = Annotated[float, BeforeValidator(EQUIVALENCE_RATIO.validate)]
Recirculation = Annotated[float, BeforeValidator(RECIRCULATION.validate)]
ResidenceTime = Annotated[float, BeforeValidator(RESIDENCE_TIME.validate)]
Mixing = Annotated[float, BeforeValidator(MIXING.validate)]
DischargeCoefficient = Annotated[float, BeforeValidator(COEFFICIENT.validate)]
LossCoefficient = Annotated[float, BeforeValidator(LOSS_COEFFICIENT.validate)]
CasingRatio = Annotated[float, BeforeValidator(CASING_RATIO.validate)]
AnnulusVelocity = Annotated[float, BeforeValidator(ANNULUS_VELOCITY.validate)]
VaneAngle = Annotated[float, BeforeValidator(VANE_ANGLE.validate)]
CasingLoss = Annotated[float, BeforeValidator(CASING_LOSS.validate)]
Conductivity = Annotated[float, BeforeValidator(CONDUCTIVITY.validate)]

HeatingValue = Annotated[float, BeforeValidator(HEATING_VALUE.validate)]
LatentHeat = Annotated[float, BeforeValidator(LATENT_HEAT.validate)]
LiquidHeat = Annotated[float, BeforeValidator(LIQUID_HEAT.validate)]
LiquidDensity = Annotated[float, BeforeValidator(LIQUID_DENSITY.validate)]
MolarMass = Annotated[float, BeforeValidator(MOLAR_MASS.validate)]
BoilingPoint = Annotated[float, BeforeValidator(BOILING_POINT.validate)]
MassFraction = Annotated[float, BeforeValidator(MASS_FRACTION.validate)]
VolumeFraction = Annotated[float, BeforeValidator(VOLUME_FRACTION.validate)]
HydrogenCarbon = Annotated[float, BeforeValidator(HYDROGEN_CARBON.validate)]
Viscosity = Annotated[float, BeforeValidator(VISCOSITY.validate)]
SurfaceTension = Annotated[float, BeforeValidator(SURFACE_TENSION.validate)]
DropSize = Annotated[float, BeforeValidator(DROP_SIZE.validate)]
FlowNumber = Annotated[float, BeforeValidator(FLOW_NUMBER.validate)]
SprayAngle = Annotated[float, BeforeValidator(SPRAY_ANGLE.validate)]
Spread = Annotated[float, BeforeValidator(SPREAD.validate)]
AirLiquidRatio = Annotated[float, BeforeValidator(AIR_LIQUID_RATIO.validate)]
AirVelocity = Annotated[float, BeforeValidator(AIR_VELOCITY.validate)]
Evaporation = Annotated[float, BeforeValidator(EVAPORATION.validate)]

Stations = Annotated[tuple[float, ...], BeforeValidator(STATION.validate_list)]
Diameters = Annotated[tuple[float, ...], BeforeValidator(DIAMETER.validate_list)]
InnerDiameters = Annotated[tuple[float, ...], BeforeValidator(INNER_DIAMETER.validate_list)]
Lengths = Annotated[tuple[float, ...], BeforeValidator(LENGTH.validate_list)]
Areas = Annotated[tuple[float, ...], BeforeValidator(AREA.validate_list)]

HoursAYear = Annotated[float, BeforeValidator(HOURS_A_YEAR.validate)]
Efficiency = Annotated[float, BeforeValidator(EFFICIENCY.validate)]
FuelShare = Annotated[float, BeforeValidator(FUEL_SHARE.validate)]
OverallPressureRatio = Annotated[float, BeforeValidator(OVERALL_PRESSURE_RATIO.validate)]
Scatter = Annotated[float, BeforeValidator(SCATTER.validate)]
Date = Annotated[datetime.date, BeforeValidator(calendar_day)]

Cans = Annotated[int, BeforeValidator(whole("number of cans", 1, 100))]
Count = Annotated[int, BeforeValidator(whole("count", 0, 100_000))]
Holes = Annotated[int, BeforeValidator(whole("number of holes", 1, 1000))]
Vanes = Annotated[int, BeforeValidator(whole("number of vanes", 1, 200))]
Streams = Annotated[int, BeforeValidator(whole("number of streams", 1, 200))]
Cells = Annotated[int, BeforeValidator(whole("number of cells", 1, 2000))]
Engines = Annotated[int, BeforeValidator(whole("engines tested", 1, 100_000))]

Title = Annotated[str, BeforeValidator(word("title", longest=200))]
Name = Annotated[str, BeforeValidator(word("name", forbidden="*"))]
Text = Annotated[str, BeforeValidator(word("text", longest=500))]
