"""What a rule file may say: a rule set, whom it binds, and its limits row by row."""

from __future__ import annotations

from typing import Annotated, Generic, Literal, TypeVar

from pydantic import BaseModel, BeforeValidator, ConfigDict, Field

from combustor.case import kinds as k
from combustor.case.quantity import Quantity, refusal, word
from combustor.emissions.emission_unit import EmissionUnit, read_unit
from combustor.emissions.pollutant import NOT_PREDICTED, POLLUTANTS

Reading = Literal["official text", "copy", "older edition", "from memory", "derived", "own permit"]
UNVERIFIED: tuple[Reading, ...] = ("from memory", "older edition")
"""Where a figure read so gives no verdict before the user has confirmed it."""
UnitState = Literal["new", "existing", "modified"]
Use = Literal["electric", "mechanical-drive", "heat-and-power", "aircraft"]
Cycle = Literal["simple", "combined"]
Duty = Literal["normal", "emergency", "research", "temporary"]
Site = Literal["continental", "arctic", "offshore", "non-continental"]
FuelClass = Literal["natural-gas", "other-gas", "gas-oil", "other-liquid"]
Aftertreatment = Literal["none", "scr", "oxidation"]

_OXYGEN = Quantity("oxygen", "ratio", 0.0, 0.21, '"15 %" or 0.15', "0 to 21 %", bare="fraction")
Oxygen = Annotated[float, BeforeValidator(_OXYGEN.validate)]
Long = Annotated[str, BeforeValidator(word("text", longest=2000))]


def _number(value: object) -> float:
    if isinstance(value, bool) or not isinstance(value, int | float) or not abs(value) < 1e12:
        raise refusal("not a number", "a bare number in the row's own unit")
    return float(value)


def _limit(value: object) -> float:
    number = _number(value)
    if number <= 0.0:
        raise refusal("a limit is above zero", "a bare number in the row's own unit")
    return number


def _pollutant(value: object) -> str:
    known = (*POLLUTANTS, *NOT_PREDICTED)
    if value not in known:
        raise refusal("no such pollutant", ", ".join(known))
    return str(value)


def _unit(value: object) -> str:
    from combustor.base.errors import InputError

    if not isinstance(value, str):
        raise refusal("a unit is text", 'as in "ppmvd@15"')
    try:
        read_unit(value)
    except InputError as error:
        problem = error.problems[0]
        raise refusal(problem.what, problem.allowed) from None
    return value


def _name(value: object) -> str:
    text = word("name")(value)
    if not all(c.isalnum() or c in "-_." for c in text):
        raise refusal("a row is named in letters, digits, - and _", "as in new-gas-electric")
    return text


Number = Annotated[float, BeforeValidator(_number)]
Limit = Annotated[float, BeforeValidator(_limit)]
PollutantName = Annotated[str, BeforeValidator(_pollutant)]
UnitText = Annotated[str, BeforeValidator(_unit)]
RowName = Annotated[str, BeforeValidator(_name)]

T = TypeVar("T")


class Table(BaseModel):
    """A table of a rule file: frozen, no key beyond those named."""

    model_config = ConfigDict(extra="forbid", frozen=True)


class Range(Table, Generic[T]):
    """Bounds of a fact; those left out do not bind."""

    above: T | None = None
    at_least: T | None = None
    below: T | None = None
    up_to: T | None = None


class When(Table):
    """What must hold, all of it; what is not named does not matter."""

    unit_state: tuple[UnitState, ...] | None = None
    use: tuple[Use, ...] | None = None
    cycle: tuple[Cycle, ...] | None = None
    duty: tuple[Duty, ...] | None = None
    site: tuple[Site, ...] | None = None
    fuel: tuple[FuelClass, ...] | None = None
    aftertreatment: tuple[Aftertreatment, ...] | None = None
    heat_input: Range[k.HeatInput] | None = None
    rated_output: Range[k.Output] | None = None
    load: Range[k.Load] | None = None
    ambient_temperature: Range[k.AmbientTemperature] | None = None
    hours: Range[k.HoursAYear] | None = None
    capacity_factor: Range[k.Share] | None = None
    efficiency: Range[k.Efficiency] | None = None
    total_efficiency: Range[k.Efficiency] | None = None
    built: Range[k.Date] | None = None
    permitted: Range[k.Date] | None = None
    type_date: Range[k.Date] | None = None
    rated_thrust: Range[k.Thrust] | None = None
    pressure_ratio: Range[k.OverallPressureRatio] | None = None
    hydrogen_share: Range[k.Share] | None = None


class Rounding(Table):
    """How the rule rounds before it compares: decimals, or figures below ``whole_above``."""

    decimals: int | None = Field(default=None, ge=0, le=8)
    figures: int | None = Field(default=None, ge=1, le=8)
    decimals_above: Number | None = None


class Scale(Table):
    """A limit that rises with efficiency: times efficiency over ``reference``."""

    reference: k.Efficiency
    cap: Limit | None = None
    never_below: bool = True


class Terms(Table):
    """A limit made of overall pressure ratio and rated thrust (kN)."""

    constant: Number
    pressure_ratio: Number = 0.0
    thrust: Number = 0.0
    product: Number = 0.0


class NitrogenAllowance(Table):
    """Addition to a limit by nitrogen in the fuel (percent by mass): constant + slope x N."""

    up_to: Number | None = None
    constant: Number = 0.0
    slope: Number = 0.0
    offset: Number = 0.0


class Row(Table):
    """One limit.

    ``when`` lists alternatives: one of them must hold. ``given`` and ``unless`` name
    conditions of the set. Rows of one ``choice`` are options: the operator picks one.
    """

    row: RowName
    pollutant: PollutantName
    limit: Limit | None = None
    terms: Terms | None = None
    unit: UnitText
    counted_as: k.Name | None = None
    when: tuple[When, ...] = ()
    given: k.Name | None = None
    unless: k.Name | None = None
    choice: RowName | None = None
    averaging: Long | None = None
    rounding: Rounding | None = None
    scale: Scale | None = None
    nitrogen: tuple[NitrogenAllowance, ...] = ()
    hydrogen_factor: Limit | None = None
    prorate_with: RowName | None = None
    ambient_correction: Literal["diffusion-flame"] | None = None
    characteristic: bool = False
    reading: Reading
    read_in: Long
    note: Long | None = None

    @property
    def emission_unit(self) -> EmissionUnit:
        """The unit as read."""
        return read_unit(self.unit)


class Exemption(Table):
    """Who is left out, of which pollutants (all when none is named)."""

    what: Long
    when: tuple[When, ...] = Field(min_length=1)
    pollutants: tuple[PollutantName, ...] = ()
    reading: Reading
    read_in: Long


class RuleSetTable(Table):
    """One rule file."""

    title: k.Title
    jurisdiction: k.Title
    countries: tuple[k.Name, ...] = ()
    reference: Long
    edition: Long
    date: k.Date
    review: k.Date
    applies_to: Long
    applies: tuple[When, ...] = ()
    oxygen_in_air: Oxygen
    reference_oxygen: Oxygen = 0.15
    heating_value: Literal["LHV", "HHV"]
    mixed_fuel_share: k.Share | None = None
    conditions: dict[k.Name, tuple[When, ...]] = Field(default_factory=dict)
    exemptions: tuple[Exemption, ...] = ()
    limits: tuple[Row, ...] = ()
    left_out: tuple[Long, ...] = ()
    notes: tuple[Long, ...] = ()
