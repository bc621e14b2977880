"""The case: what the engineer states. Frozen, SI inside; files are read in ``load``.

Keys, their units when written bare, and their defaults stand here once.
"""

from __future__ import annotations

import math
from collections.abc import Mapping
from typing import Any, Literal

from pydantic import (
    BaseModel,
    ConfigDict,
    Field,
    PrivateAttr,
    SerializerFunctionWrapHandler,
    model_serializer,
    model_validator,
)

from combustor.case import kinds as k
from combustor.case.flight import FLIGHT_KEYS, INLET_KEYS, with_inlet
from combustor.case.hardware_table import HardwareTable

Layout = Literal["can", "can-annular", "annular"]
Flow = Literal["straight", "reverse"]
PointKind = Literal["rated", "part", "idle", "relight"]
FrontEnd = Literal["diffusion", "rich-lean", "lean-premixed"]

ISO_HUMIDITY = 0.00634
"""Water per dry air of the ISO day (15 degC, 60 % relative humidity), kg/kg."""


class Table(BaseModel):
    """A table of the case file: frozen, no key beyond those named."""

    model_config = ConfigDict(extra="forbid", frozen=True)


class Annulus(Table):
    """Inner and outer diameter of an annulus, m."""

    inner: k.InnerDiameter
    outer: k.Diameter

    @property
    def area(self) -> float:
        """Flow area, m2."""
        return math.pi / 4.0 * (self.outer**2 - self.inner**2)


class Combustor(Table):
    """``[combustor]``: layout and the room there is. Lengths and diameters in m.

    ``casing_diameter`` is the bore of one can's casing; an annular or can-annular machine
    states ``casing_outer_diameter`` and ``casing_inner_diameter``. ``casing_length`` runs
    from compressor-exit flange to turbine-inlet flange.
    """

    layout: Layout
    cans: k.Cans = 1
    flow: Flow = "straight"
    casing_diameter: k.Envelope | None = None
    casing_outer_diameter: k.Envelope | None = None
    casing_inner_diameter: k.InnerDiameter | None = None
    casing_length: k.Envelope | None = None
    inlet_annulus: Annulus | None = None
    exit_annulus: Annulus | None = None
    transition_length: k.DuctLength = 0.0


class FuelCertificate(Table):
    """``[fuel.certificate]``: a liquid fuel as its supplier states it.

    Fractions by mass, ``aromatics`` by volume; ``density`` and ``latent_heat`` at 15 degC;
    ``hydrogen`` or ``hydrogen_carbon_ratio`` (atoms), ``molar_mass`` or ``mid_boiling_point``.
    """

    net_heating_value: k.HeatingValue
    density: k.LiquidDensity
    hydrogen: k.MassFraction | None = None
    hydrogen_carbon_ratio: k.HydrogenCarbon | None = None
    oxygen: k.MassFraction = 0.0
    nitrogen: k.MassFraction = 0.0
    sulfur: k.MassFraction = 0.0
    molar_mass: k.MolarMass | None = None
    mid_boiling_point: k.BoilingPoint | None = None
    latent_heat: k.LatentHeat | None = None
    aromatics: k.VolumeFraction | None = None
    heat_capacity: k.LiquidHeat | None = None
    viscosity: k.Viscosity | None = None
    surface_tension: k.SurfaceTension | None = None


class Atomiser(Table):
    """``[fuel.atomiser]``: how a liquid fuel is broken up; left alone by gases.

    ``drop_size`` (Sauter mean, measured or wanted) stands in for any correlation. Air velocity
    and air-liquid ratio left out are those of the swirler; ``count`` atomisers share the fuel.
    """

    kind: Literal["pressure-swirl", "prefilming-airblast"] = "prefilming-airblast"
    count: k.Holes | None = None
    drop_size: k.DropSize | None = None
    spread: k.Spread = 3.0
    evaporation_constant: k.Evaporation | None = None
    flow_number: k.FlowNumber | None = None
    orifice_diameter: k.HoleDiameter | None = None
    spray_angle: k.SprayAngle = math.pi / 2.0
    prefilmer_diameter: k.HoleDiameter | None = None
    hydraulic_diameter: k.HoleDiameter | None = None
    air_velocity: k.AirVelocity | None = None
    air_liquid_ratio: k.AirLiquidRatio | None = None


class Fuel(Table):
    """``[fuel]``: catalogue name or blend, mole fractions, or a liquid's certificate; K, Pa."""

    name: k.Name | None = None
    composition: dict[str, k.MoleFraction] | None = None
    certificate: FuelCertificate | None = None
    atomiser: Atomiser | None = None
    temperature: k.FuelTemperature = 288.15
    supply_pressure: k.SupplyPressure | None = None


class Point(Table):
    """``[[points]]``: one operating point.

    ``air_flow`` is moist, whole machine, kg/s; ``inlet_pressure`` total and absolute, Pa;
    temperatures K; ``humidity`` kg water per kg dry air; ``load`` in percent of rated
    output; ``output`` W; ``water_injection`` kg/s. Exactly one of ``exit_temperature``,
    ``fuel_flow`` and ``fuel_air_ratio`` is not None. Given ``altitude`` (geopotential m of the
    standard day), inlet pressure and temperature are those behind the intake at ``flight_mach``,
    with ``ram_recovery`` of the isentropic pressure rise: ram air, or a windmilling engine.
    """

    name: k.Name
    kind: PointKind
    air_flow: k.AirFlow
    inlet_pressure: k.InletPressure
    inlet_temperature: k.InletTemperature
    exit_temperature: k.ExitTemperature | None = None
    fuel_flow: k.FuelFlow | None = None
    fuel_air_ratio: k.FuelAirRatio | None = None
    humidity: k.Humidity = ISO_HUMIDITY
    fuel_temperature: k.FuelTemperature | None = None
    load: k.Load | None = None
    output: k.Output | None = None
    water_injection: k.WaterFlow = 0.0
    ambient_temperature: k.AmbientTemperature | None = None
    ambient_pressure: k.AmbientPressure | None = None
    cycle_mode: k.Text | None = None
    fuel_split: dict[str, k.Share] | None = None
    altitude: k.Altitude | None = None
    flight_mach: k.FlightMach = 0.0
    ram_recovery: k.RamRecovery = 1.0

    @model_validator(mode="before")
    @classmethod
    def _from_flight(cls, stated: Any) -> Any:
        return with_inlet(stated) if isinstance(stated, Mapping) else stated

    @model_serializer(mode="wrap")
    def _as_stated(self, serialise: SerializerFunctionWrapHandler) -> dict[str, Any]:
        # what follows from the flight is not stated again, nor a flight that there is not
        whole: dict[str, Any] = serialise(self)
        left_out = FLIGHT_KEYS if self.altitude is None else INLET_KEYS
        return {key: value for key, value in whole.items() if key not in left_out}


class ZoneEquivalenceRatios(Table):
    """Equivalence ratio wanted at the end of the primary and secondary zone."""

    primary: k.EquivalenceRatio = 0.95
    secondary: k.EquivalenceRatio = 0.60


class WantedEmissions(Table):
    """Mole fractions wanted, dry at 15 % O2; None where nothing is asked."""

    nox: k.Concentration | None = None
    co: k.Concentration | None = None


class Targets(Table):
    """``[targets]``: what is wanted, and the choices sizing may be held to.

    None leaves the choice to sizing. ``pressure_loss`` is (inlet total - exit total) /
    inlet total. Lengths m, angles rad, temperatures K, air shares as fractions of air_flow.
    """

    design_point: k.Name = ""
    pressure_loss: k.PressureLoss | None = None
    front_end: FrontEnd = "diffusion"
    equivalence_ratio: ZoneEquivalenceRatios = Field(default_factory=ZoneEquivalenceRatios)
    pattern_factor: k.PatternFactor = 0.15
    wall_temperature: k.WallTemperature = 1123.15
    emissions: WantedEmissions = Field(default_factory=WantedEmissions)

    liner_area_ratio: k.AreaRatio | None = None
    annulus_velocity: k.AnnulusVelocity | None = None
    diffuser_kind: Literal["faired", "dump"] | None = None
    diffuser_loss_coefficient: k.LossCoefficient | None = None
    swirler_air: k.Fraction | None = None
    dome_air: k.Fraction | None = None
    film_air: k.Fraction | None = None
    leakage: k.Fraction = 0.02
    swirler_vane_angle: k.VaneAngle = math.pi / 4.0
    swirler_vane_count: k.Vanes = 12
    swirler_vane_thickness: k.Thickness = 1.2e-3
    swirler_vane_shape: Literal["flat", "curved"] = "flat"
    swirler_hub_diameter: k.HubDiameter | None = None
    swirlers: k.Holes | None = None
    pilot_fuel: k.Fraction = 0.10
    premixer_time: k.ResidenceTime = 1.0e-3
    outer_dilution: k.Fraction | None = None
    hole_edge: Literal["plain", "plunged"] = "plain"
    primary_holes: k.Holes | None = None
    secondary_holes: k.Holes | None = None
    dilution_holes: k.Holes | None = None
    primary_length: k.Length | None = None
    secondary_length: k.Length | None = None
    dilution_length: k.Length | None = None
    slot_pitch: k.Pitch | None = None
    slot_height: k.SlotHeight | None = None
    drill_step: k.DrillStep | None = None
    sheet_thickness: k.Thickness = 1.2e-3
    sheet_conductivity: k.Conductivity = 26.0
    sheet_emissivity: k.Emissivity = 0.8
    casing_emissivity: k.Emissivity = 0.7
    coating_thickness: k.CoatingThickness = 0.0
    coating_conductivity: k.Conductivity = 1.0
    roughness: k.Roughness = 1.5e-6


class Model(Table):
    """``[model]``: settings of the reactor networks; None is the tool's default.

    ``unmixedness``: standard deviation of mixture fraction over its mean; ``recirculation``:
    recirculated mass per fresh mass; ``mixing``: exchange rate, 1/s; ``primary_jet_share``:
    share of the primary row's air that burns in the primary zone; ``casing_loss_coefficient``:
    casing to its surroundings at 15 degC, W/m2/K of casing, no loss where left out.
    """

    unmixedness: k.Unmixedness | None = None
    recirculation: k.Recirculation | None = None
    mixing: k.Mixing | None = None
    mechanism: k.Text | None = None
    streams: k.Streams | None = None
    cells: k.Cells | None = None
    wall_stations: k.Cells | None = None
    primary_jet_share: k.Share = 0.5
    casing_loss_coefficient: k.CasingLoss | None = None


class Scatter(Table):
    """Standard deviation of ln(measured / predicted), where the user knows it better."""

    NOx: k.Scatter | None = None
    CO: k.Scatter | None = None
    UHC: k.Scatter | None = None
    N2O: k.Scatter | None = None
    NH3: k.Scatter | None = None


class Rules(Table):
    """``[rules]``: which emission rules bind, and the facts they need.

    ``names``: shipped sets or paths of the user's own files; ``heat_input`` W on
    ``heat_input_basis``; dates of construction (``built``), permit and type certificate;
    ``hours`` operated a year; efficiencies on LHV at ISO base load; ``fuel_sulfur`` and
    ``fuel_nitrogen`` as shares of the fuel's mass; ``confirmed``: "SET/ROW: where it was read".
    """

    names: tuple[k.Text, ...] = ()
    country: k.Name | None = None
    heat_input: k.HeatInput | None = None
    heat_input_basis: Literal["LHV", "HHV"] | None = None
    rated_output: k.Output | None = None
    unit_state: Literal["new", "existing", "modified"] | None = None
    use: k.Text | None = None
    cycle: Literal["simple", "combined"] | None = None
    duty: Literal["normal", "emergency", "research", "temporary"] | None = None
    site: Literal["continental", "arctic", "offshore", "non-continental"] | None = None
    aftertreatment: Literal["none", "scr", "oxidation"] | None = None
    built: k.Date | None = None
    permitted: k.Date | None = None
    type_date: k.Date | None = None
    hours: k.HoursAYear | None = None
    capacity_factor: k.Share | None = None
    efficiency: k.Efficiency | None = None
    total_efficiency: k.Efficiency | None = None
    fuel_class: Literal["natural-gas", "other-gas", "gas-oil", "other-liquid"] | None = None
    fuel_sulfur: k.FuelShare | None = None
    fuel_nitrogen: k.FuelShare | None = None
    rated_thrust: k.Thrust | None = None
    pressure_ratio: k.OverallPressureRatio | None = None
    engines_tested: k.Engines | None = None
    scatter: Scatter = Field(default_factory=Scatter)
    confirmed: tuple[k.Text, ...] = ()


class Case(Table):
    """A whole case file. Read one with ``load_case``."""

    title: k.Title = "untitled"
    combustor: Combustor
    fuel: Fuel
    points: tuple[Point, ...] = Field(min_length=1)
    targets: Targets = Field(default_factory=Targets)
    hardware: HardwareTable | None = None
    model: Model = Field(default_factory=Model)
    rules: Rules = Field(default_factory=Rules)

    _text: str = PrivateAttr(default="")
    _file: str = PrivateAttr(default="")
    _sha256: str = PrivateAttr(default="")

    @property
    def text(self) -> str:
        """The text this case was read from; empty when it was not read."""
        return self._text

    @property
    def file(self) -> str:
        """Name of the file it was read from."""
        return self._file

    @property
    def sha256(self) -> str:
        """Digest of the text this case was read from, hex."""
        return self._sha256

    @property
    def design_point(self) -> Point:
        """The point that sizing aims at."""
        return self.point(self.targets.design_point)

    def point(self, name: str) -> Point:
        """Return the point called ``name``; KeyError when there is none."""
        for point in self.points:
            if point.name == name:
                return point
        raise KeyError(name)

    def __eq__(self, other: Any) -> bool:
        """Two cases are the same when they say the same, wherever they were read."""
        return isinstance(other, Case) and self.__dict__ == other.__dict__

    # a case holds mappings, so it is no key; the base class declares a method here
    __hash__ = None  # type: ignore[assignment]
