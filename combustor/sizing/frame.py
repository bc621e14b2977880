"""Liner, diffuser and zone lengths inside a casing."""

from __future__ import annotations

import math
from dataclasses import dataclass, replace

from combustor.base.errors import InfeasibleError
from combustor.base.method import Method, Notice
from combustor.case.schema import Case, Targets
from combustor.sizing import liner_ratio as ratios
from combustor.sizing import zones
from combustor.sizing.burnout import Burnout
from combustor.sizing.casing import Casing
from combustor.sizing.diffuser import STATED, DiffuserShape, choose
from combustor.sizing.duty import Duty
from combustor.sizing.record import Candidate
from combustor.sizing.reference_area import corrected_loss
from combustor.sizing.section import CAN_CLEARANCE, Section

LINER_FITS_LENGTH = Method(
    key="liner-fits-length",
    quantity="liner area ratio that lets the length for the pattern factor fit",
    source="longest liner the casing holds over the length in liner heights that the pattern "
    "factor needs, Lefebvre 1984",
    reading="from memory",
)

# spare length against the rounding of holes: the loss factor is only known afterwards
LENGTH_MARGIN = 1.01
LEAST_DILUTION_RATIO = 0.5
LEAST_RATIO_IN_RING = 0.30
LEAST_JET_LOSS = 0.3
_LAW_PASSES = 4
# the annulus is sized on inlet totals; behind the diffuser the air is 1 to 2 % faster
_MACH_MARGIN = 0.98
_RATIO_STEP = 0.0025


@dataclass(frozen=True)
class LossShares:
    """Losses as fractions of the inlet total pressure.

    ``jets`` is the mean drop across the liner wall that drives its jets.
    """

    diffuser: float
    hot: float
    jets: float


@dataclass(frozen=True)
class Frame:
    """Liner, diffuser and lengths.

    Parameters
    ----------
    liner_height : float
        Rounded to a millimetre [m]
    ratio : float
        Liner area over reference area as wanted before rounding [-]
    ratio_method, ratio_candidate, ratio_note : how it came about
    diffuser, rival_diffuser : DiffuserShape
    zone_ends : tuple of float
        [m]
    length_ratio_needed : float
        Liner length over height by the pattern-factor law [-]
    dilution_ratio_chart : float
        Dilution length over height by the charts [-]
    loss_factor : float
        Liner loss over reference head [-]
    notices : tuple of Notice
    """

    liner_height: float
    ratio: float
    ratio_method: Method
    ratio_candidate: Candidate
    ratio_note: str
    diffuser: DiffuserShape
    rival_diffuser: DiffuserShape
    zone_ends: tuple[float, float, float]
    length_ratio_needed: float
    dilution_ratio_chart: float
    loss_factor: float
    notices: tuple[Notice, ...]

    @property
    def liner_length(self) -> float:
        """Dome face to liner exit [m]."""
        return self.zone_ends[-1]


def highest_annulus_velocity(duty: Duty, targets: Targets) -> float:
    """Return the stated annulus velocity, or the most that practice allows [m/s].

    The Mach number is held at the operating point with the highest corrected flow.
    """
    if targets.annulus_velocity is not None:
        return targets.annulus_velocity
    design = _corrected_flow(duty.inlet.mass_flow, duty.inlet.temperature, duty.inlet.pressure)
    running = [point for point in duty.points if point.kind != "relight"]
    highest = max(
        design, *(_corrected_flow(p.air_flow, p.temperature, p.pressure) for p in running)
    )
    by_mach = _MACH_MARGIN * ratios.HIGHEST_ANNULUS_MACH * duty.speed_of_sound
    return min(ratios.HIGHEST_ANNULUS_VELOCITY, by_mach * design / highest)


def _corrected_flow(air_flow: float, temperature: float, pressure: float) -> float:
    return air_flow * math.sqrt(temperature) / pressure


def frame_of(
    case: Case,
    duty: Duty,
    section: Section,
    casing: Casing,
    loss: LossShares,
    front_share: float,
    is_firm: bool = True,
    burnout: Burnout | None = None,
    drawn: float | None = None,
) -> Frame:
    """Return liner, diffuser and lengths.

    Parameters
    ----------
    case : Case
    duty : Duty
    section : Section
    casing : Casing
    loss : LossShares
        Latest estimate of the parts of the pressure loss.
    front_share : float
        Share of the air through swirler and dome [-]
    is_firm : bool
        False while the losses are only guessed: a liner a little too long is let pass.
    burnout : Burnout or None
        Of a lean flame; its length takes the place of the secondary zone's.
    drawn : float or None
        Liner height that ``loss`` was solved with: the hot loss falls as the liner area squared,
        and what it leaves to the jets sets the length. None takes the loss as it is [m]

    Raises
    ------
    InfeasibleError
        The length for the pattern factor does not fit the casing.
    """
    targets, inlet = case.targets, duty.inlet
    head = corrected_loss(
        inlet.mass_flow, inlet.temperature, inlet.pressure, casing.area, inlet.gas_constant
    )
    height = section.largest_liner(casing.height, targets.sheet_thickness)
    for _ in range(_LAW_PASSES):
        before = height
        loss_factor = loss.jets / head * _law_share(section, casing, height)
        needed = LENGTH_MARGIN * zones.length_ratio_for(
            targets.pattern_factor, loss_factor, section.is_round
        )
        needed = max(needed, _shortest(targets))
        builder = _Builder(
            case, duty, section, casing, needed, is_firm, front_share, burnout, loss, drawn
        )
        ratio, method, rival, note = _liner_ratio(builder, head, front_share)
        height = round(section.height(ratio * casing.area), 3)
        if height == before or section.layout != "can-annular":
            break
    needed = builder.length_ratio_at(height)
    shape, other = builder.diffuser(height)
    chart = zones.dilution_length_ratio(targets.pattern_factor, loss_factor)
    ends = _zone_ends(builder, height, chart.value, builder.room(height))
    return Frame(
        height,
        ratio,
        method,
        rival,
        note,
        shape,
        other,
        ends,
        needed / LENGTH_MARGIN,
        chart.value,
        loss_factor,
        chart.notices,
    )


def _law_share(section: Section, casing: Casing, height: float) -> float:
    """Return the head of the casing over that the pattern-factor law is taken on."""
    if section.layout != "can-annular" or height <= 0.0:
        return 1.0
    return (zones.law_area(casing.area, section.area(height), True) / casing.area) ** 2


@dataclass(frozen=True)
class _Builder:
    """What every step of this module needs."""

    case: Case
    duty: Duty
    section: Section
    casing: Casing
    length_ratio: float
    is_firm: bool
    front_share: float
    burnout: Burnout | None
    loss: LossShares
    drawn: float | None

    def length_ratio_at(self, height: float) -> float:
        """Return the liner length over height, with the hot loss of that height."""
        if self.drawn is None:
            return self.length_ratio
        hot = self.loss.hot * (self.section.area(self.drawn) / self.section.area(height)) ** 2
        jets = self.loss.jets + self.loss.hot - hot
        if jets <= LEAST_JET_LOSS * self.loss.jets:
            return math.inf
        return max(self.length_ratio * self.loss.jets / jets, _shortest(self.case.targets))

    def annulus_area(self, height: float) -> float:
        outside = height + 2.0 * self.case.targets.sheet_thickness
        return self.casing.area - self.section.area(outside)

    def diffuser(self, height: float) -> tuple[DiffuserShape, DiffuserShape]:
        inlet = self.case.combustor.inlet_annulus
        assert inlet is not None  # required of a case without metal
        gap = 0.5 * (inlet.outer - inlet.inner)
        targets = self.case.targets
        taken, other = choose(inlet.area, gap, self.annulus_area(height), targets.diffuser_kind)
        if targets.diffuser_loss_coefficient is not None:
            taken = replace(taken, loss_coefficient=targets.diffuser_loss_coefficient)
        return taken, other

    def room(self, height: float) -> float:
        """Return the longest liner the casing holds."""
        combustor = self.case.combustor
        assert combustor.casing_length is not None
        used = combustor.transition_length
        if combustor.flow == "straight":
            used += self.diffuser(height)[0].length
        return combustor.casing_length - used

    def stated_length(self) -> float | None:
        """Return the liner length when all three zones are stated."""
        targets = self.case.targets
        stated = (targets.primary_length, targets.secondary_length, targets.dilution_length)
        if any(length is None for length in stated):
            return None
        return sum(length for length in stated if length is not None)

    def secondary_length(self, height: float) -> float:
        """Return the secondary zone: stated, half a height, or what burns CO out."""
        targets = self.case.targets
        if targets.secondary_length is not None:
            return targets.secondary_length
        shortest = zones.SECONDARY_LENGTH_RATIO * height
        if self.burnout is None:
            return shortest
        flow = self.front_share * self.duty.inlet.mass_flow + self.duty.fuel_flow
        velocity = flow / (self.burnout.density * self.section.area(height))
        return max(shortest, velocity * self.burnout.time)

    def needed_length(self, height: float) -> float:
        """Return the liner length a height needs."""
        stated = self.stated_length()
        if stated is not None:
            return stated
        by_law = self.length_ratio_at(height) * height
        if self.burnout is None:
            return by_law
        ends = zones.PRIMARY_LENGTH_RATIO + LEAST_DILUTION_RATIO
        # a whole millimetre a zone for rounding
        return max(by_law, ends * height + self.secondary_length(height) + 2e-3)

    def fits(self, height: float, margin: float = LENGTH_MARGIN) -> bool:
        """Say whether a liner fits the casing, with that margin on the pattern-factor law."""
        needed = self.needed_length(height)
        if self.stated_length() is None and self.burnout is None:
            needed *= margin / LENGTH_MARGIN
        return needed <= self.room(height)


def _shortest(targets: Targets) -> float:
    """Return the least liner length over height that holds three zones."""
    return zones.PRIMARY_LENGTH_RATIO + zones.SECONDARY_LENGTH_RATIO + LEAST_DILUTION_RATIO


def _liner_ratio(
    builder: _Builder, head: float, front_share: float
) -> tuple[float, Method, Candidate, str]:
    targets = builder.case.targets
    layout = builder.case.combustor.layout
    simple = Candidate(
        ratios.SIMPLE_RATIOS[layout], ratios.SIMPLE_RATIO, "a rule by layout, blind to the losses"
    )
    if targets.liner_area_ratio is not None:
        ratio = targets.liner_area_ratio
        _check_length(builder, ratio)
        return ratio, STATED, simple, "stated in the case"
    inlet_annulus = builder.case.combustor.inlet_annulus
    assert inlet_annulus is not None
    guess = builder.section.height(0.65 * builder.casing.area)
    optimum = ratios.optimum_ratio(
        front_share,
        builder.diffuser(guess)[0].loss_coefficient,
        builder.casing.area / inlet_annulus.area,
        (builder.case.targets.pressure_loss or 0.0) / head,
    )
    ratio, method, rival, note = optimum.value, ratios.OPTIMUM_RATIO, simple, optimum.bounded
    wide = max(_ratio_by_annulus(builder, front_share), ratios.LOWEST_RATIO)
    if wide < ratio or targets.annulus_velocity is not None:
        rival = Candidate(ratio, method, "the annulus would be too fast")
        ratio, method = wide, ratios.ANNULUS_VELOCITY
        note = f"annulus at {highest_annulus_velocity(builder.duty, targets):.0f} m/s"
    height = builder.section.height(ratio * builder.casing.area)
    if not builder.fits(height):
        rival = Candidate(ratio, method, "its liner would be too long for the casing")
        ratio, method = _longest_fit(builder, ratio), LINER_FITS_LENGTH
        note = (
            f"{builder.length_ratio_at(builder.section.height(ratio * builder.casing.area)):.2f} "
            "liner heights in "
            f"{1e3 * builder.room(builder.section.height(ratio * builder.casing.area)):.0f} mm"
        )
    return _beside_neighbours(builder, ratio, method, rival, note)


def _beside_neighbours(
    builder: _Builder, ratio: float, method: Method, rival: Candidate, note: str
) -> tuple[float, Method, Candidate, str]:
    """Return the ratio held to what cans in one casing ring leave each other."""
    section, casing = builder.section, builder.casing
    largest = section.largest_liner(casing.height, builder.case.targets.sheet_thickness)
    if section.height(ratio * casing.area) <= largest:
        return ratio, method, rival, note
    if largest <= 0.0 or section.area(largest) / casing.area < LEAST_RATIO_IN_RING:
        _refuse_cans(builder, largest)
    rival = Candidate(ratio, method, "the cans would touch each other or the casing")
    note = f"{section.cans} cans in a ring {1e3 * casing.height:.0f} mm high"
    # rounded down, so that the millimetre of the drawing still fits
    fitting = section.area(math.floor(1e3 * largest) / 1e3) / casing.area
    return fitting, CAN_CLEARANCE, rival, note


def _refuse_cans(builder: _Builder, largest: float) -> None:
    section, casing = builder.section, builder.casing
    mean = section.mean_diameter or 0.0
    best = max(round(math.pi * mean / (1.1 * casing.height)), 2)
    raise InfeasibleError(
        (
            f"{section.cans} cans stand in a casing ring {1e3 * casing.height:.0f} mm high on a "
            f"mean diameter of {1e3 * mean:.0f} mm",
            f"beside its neighbours and the casing a liner can be {1e3 * largest:.0f} mm at most",
            f"the liners would fill less than {LEAST_RATIO_IN_RING:.0%} of the casing",
        ),
        f"About {best} cans fill this ring; or state another envelope.",
    )


def _ratio_by_annulus(builder: _Builder, front_share: float) -> float:
    """Return the liner ratio that leaves the annulus its velocity beside the liner's sheet."""
    section, casing = builder.section, builder.casing
    outside = ratios.ratio_for_annulus_velocity(
        highest_annulus_velocity(builder.duty, builder.case.targets),
        (1.0 - front_share) * builder.duty.inlet.mass_flow,
        builder.duty.density,
        casing.area,
    )
    if outside <= 0.0:
        return 0.0
    sheet = 2.0 * builder.case.targets.sheet_thickness
    height = section.height(outside * casing.area) - sheet
    return section.area(max(height, 0.0)) / casing.area


def _longest_fit(builder: _Builder, ratio: float) -> float:
    """Return the largest liner ratio whose length fits the casing.

    A scan: a smaller liner is shorter, but leaves a wider annulus and a longer diffuser.
    """
    # the margin on the law is given up before the liner is
    for margin in (LENGTH_MARGIN, 1.0):
        trial = ratio
        while trial > ratios.LOWEST_RATIO:
            if builder.fits(builder.section.height(trial * builder.casing.area), margin):
                return trial
            trial -= _RATIO_STEP
    _check_length(builder, ratios.LOWEST_RATIO)
    return ratios.LOWEST_RATIO


def _check_length(builder: _Builder, ratio: float) -> None:
    height = builder.section.height(ratio * builder.casing.area)
    if builder.fits(height, 1.0) or not builder.is_firm:
        return
    room = builder.room(height)
    targets = builder.case.targets
    stated = builder.stated_length()
    needed = builder.needed_length(height)
    reason = (
        "the stated zone lengths add up to"
        if stated is not None
        else f"a pattern factor of {targets.pattern_factor:.3g} needs a liner of "
        f"{builder.length_ratio_at(height):.2f} liner heights, at a liner area ratio of {ratio:.2f}"
    )
    if builder.burnout is not None and stated is None:
        reason = (
            f"flame, burn-out of CO to {1e6 * builder.burnout.wanted:.0f} ppm in "
            f"{1e3 * builder.burnout.time:.1f} ms and the exit need, at a liner area ratio of "
            f"{ratio:.2f},"
        )
    raise InfeasibleError(
        (
            f"{reason} {1e3 * needed:.0f} mm",
            f"the casing of {1e3 * (builder.case.combustor.casing_length or 0.0):.0f} mm leaves "
            f"{1e3 * room:.0f} mm beside diffuser and transition duct",
            "the liner does not fit",
        ),
        "Allow a higher pattern_factor or pressure_loss, a shorter transition, or a longer casing.",
    )


def _zone_ends(
    builder: _Builder, height: float, chart: float, room: float
) -> tuple[float, float, float]:
    targets = builder.case.targets
    primary = _whole(targets.primary_length or zones.PRIMARY_LENGTH_RATIO * height)
    secondary = _whole(builder.secondary_length(height))
    if targets.dilution_length is not None:
        dilution = _whole(targets.dilution_length)
    else:
        by_law = builder.length_ratio_at(height) * height - primary - secondary
        # the longer of the two rules where the casing has the room, the law's length at least
        most = math.floor(room * 1e3 + 1e-6) / 1e3 - primary - secondary
        dilution = min(max(by_law, chart * height), most)
        dilution = max(_whole(dilution), _whole(LEAST_DILUTION_RATIO * height))
    return primary, round(primary + secondary, 3), round(primary + secondary + dilution, 3)


def _whole(length: float) -> float:
    return round(length, 3)
