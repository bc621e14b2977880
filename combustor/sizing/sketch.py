"""Everything about the metal but the sizes of its openings."""

from __future__ import annotations

import math
from dataclasses import dataclass
from functools import cached_property
from typing import Literal

from combustor.sizing.diffuser import DiffuserShape
from combustor.sizing.section import Section

RowName = Literal["primary", "secondary", "dilution"]

SWIRLER, PREMIXER, DOME, LEAK, CROSS_FIRE = (
    "swirler",
    "premixer",
    "dome",
    "leakage",
    "cross-fire",
)


@dataclass(frozen=True)
class Row:
    """One row of jets; name and role are the same word. ``count`` is that of all sides."""

    name: RowName
    station: float
    count: int


@dataclass(frozen=True)
class SlotRing:
    """One film slot: lip end, heights, and the drill of its metering holes; m.

    A ring liner has one of each at either wall.
    """

    name: str
    station: float
    height: float
    lip_thickness: float
    hole_diameter: float


@dataclass(frozen=True)
class VanePack:
    """Swirler as chosen; ``hub_diameter`` None keeps ``hub_ratio``. m and rad."""

    angle: float
    count: int
    thickness: float
    loss: float
    hub_ratio: float
    hub_diameter: float | None = None


@dataclass(frozen=True)
class Premixing:
    """Premixer round the pilot's swirler.

    Parameters
    ----------
    vanes : VanePack
        Its hub follows from the pilot's tip.
    pilot_fuel : float
        Share of the fuel through the pilot [-]
    length : float
        From the fuel's entry to the dome face [m]
    """

    vanes: VanePack
    pilot_fuel: float
    length: float


@dataclass(frozen=True)
class Sheet:
    """Liner sheet, coating and casing surface; SI."""

    thickness: float
    conductivity: float
    emissivity: float
    casing_emissivity: float
    coating_thickness: float
    coating_conductivity: float
    roughness: float


@dataclass(frozen=True)
class SideShape:
    """One annulus and the wall beside it, of one can.

    Parameters
    ----------
    side : {"outer", "inner"}
    perimeter : float
        Gas side of the wall [m]
    annulus_area, annulus_diameter : float
        Flow area and hydraulic diameter [m2], [m]
    casing_area_ratio : float
        Liner outside over casing inside [-]
    row_share : float
        Share of a row's air that enters here [-]
    """

    side: Literal["outer", "inner"]
    perimeter: float
    annulus_area: float
    annulus_diameter: float
    casing_area_ratio: float
    row_share: float


@dataclass(frozen=True)
class Sketch:
    """The metal without the sizes of its openings. Lengths m, areas m2.

    ``zone_ends`` are the axial ends of primary, secondary and dilution zone; the last is the
    liner's. ``drill_step`` None leaves the steps to the drill series. ``swirlers`` is their
    number in one can; ``outer_dilution`` the outer wall's share of the dilution air of a ring,
    None for that of the other rows.
    """

    section: Section
    flow: Literal["straight", "reverse"]
    casing_height: float
    liner_height: float
    zone_ends: tuple[float, float, float]
    transition_length: float
    exit_area: float
    diffuser: DiffuserShape
    inlet_area: float
    vane_pack: VanePack
    dome_hole_diameter: float
    rows: tuple[Row, ...]
    slots: tuple[SlotRing, ...]
    hole_edge: Literal["plain", "plunged"]
    sheet: Sheet
    drill_step: float | None = None
    swirlers: int = 1
    premixing: Premixing | None = None
    outer_dilution: float | None = None

    @property
    def liner_length(self) -> float:
        """Dome face to liner exit [m]."""
        return self.zone_ends[-1]

    @property
    def liner_area(self) -> float:
        """Flow area of one liner [m2]."""
        return self.section.area(self.liner_height) / self.section.cans

    @property
    def annulus_area(self) -> float:
        """Annulus area of one can, both sides of a ring [m2]."""
        outside = self.liner_height + 2.0 * self.sheet.thickness
        return (
            self.section.casing_area(self.casing_height) - self.section.area(outside)
        ) / self.section.cans

    @property
    def annulus_gap(self) -> float:
        """Radial gap; half the hydraulic diameter where cans share a ring [m]."""
        if self.section.layout != "can-annular":
            return 0.5 * (self.casing_height - self.liner_height) - self.sheet.thickness
        wetted = self.section.perimeter(self._outside) + self.section.casing_perimeter(
            self.casing_height
        )
        return 2.0 * self.annulus_area / wetted

    @property
    def perimeter(self) -> float:
        """Gas-side perimeter of one liner, both walls of a ring [m]."""
        return self.section.perimeter(self.liner_height)

    @cached_property
    def sides(self) -> tuple[SideShape, ...]:
        """Return the annuli with their walls, outer first."""
        section = self.section
        if section.is_round:
            ratio = section.perimeter(self._outside) / section.casing_perimeter(self.casing_height)
            gap = 2.0 * self.annulus_gap
            return (SideShape("outer", self.perimeter, self.annulus_area, gap, ratio, 1.0),)
        mean = section.mean_diameter
        assert mean is not None  # a ring has one
        height, casing, outside = self.liner_height, self.casing_height, self._outside
        # each side's rows mix the gas between its wall and the mean diameter
        outer_share = 0.5 + 0.25 * height / mean
        return (
            _ring_side("outer", mean + height, mean + casing, mean + outside, outer_share),
            _ring_side("inner", mean - height, mean - casing, mean - outside, 1.0 - outer_share),
        )

    def row(self, name: str) -> Row:
        """Return the row called ``name``; KeyError when there is none."""
        for row in self.rows:
            if row.name == name:
                return row
        raise KeyError(name)

    def names(self, name: str) -> tuple[str, ...]:
        """Return the names of the openings that a row, a slot or the leakage consists of."""
        if len(self.sides) == 1:
            return (name,)
        return tuple(f"{name}-{shape.side}" for shape in self.sides)

    def row_shares(self, name: str) -> tuple[float, ...]:
        """Return the share of a row's air by side."""
        if name == "dilution" and self.outer_dilution is not None and len(self.sides) == 2:
            return (self.outer_dilution, 1.0 - self.outer_dilution)
        return tuple(shape.row_share for shape in self.sides)

    def wall_shares(self) -> tuple[float, ...]:
        """Return each wall's share of the perimeter, by which films and leakage are shared."""
        return tuple(shape.perimeter / self.perimeter for shape in self.sides)

    @property
    def _outside(self) -> float:
        return self.liner_height + 2.0 * self.sheet.thickness


def _ring_side(
    side: Literal["outer", "inner"], wall: float, casing: float, outside: float, row_share: float
) -> SideShape:
    """Return one side of a ring from the diameters of wall, casing and liner outside."""
    area = 0.25 * math.pi * abs(casing**2 - outside**2)
    return SideShape(side, math.pi * wall, area, abs(casing - outside), outside / casing, row_share)
