"""The flame tube and its casing as metal: passages, walls, openings, zones.

One geometry model serves every layout: passages have areas along the axis, walls have
perimeters, and every opening sits at an axial station on a side. No physics module needs
to ask whether the machine is a can or an annulus. All lengths in m, areas in m2, angles in
rad. Dimensions and counts are per can; ``Hardware.cans`` scales them to the machine (an
annular machine has ``cans = 1``). Axial position x counts from the dome face.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

import numpy as np
from numpy.typing import ArrayLike, NDArray

Role = Literal[
    "swirler", "premixer", "dome", "primary", "secondary", "dilution", "film", "effusion", "leak"
]
Side = Literal["dome", "outer", "inner"]
Edge = Literal["plain", "plunged", "swirler", "metering", "orifice"]
Feed = Literal["total", "static"]
Layout = Literal["can", "can-annular", "annular"]


@dataclass(frozen=True)
class AxialProfile:
    """A quantity given at stations along the axis, linear between them, flat beyond.

    Parameters
    ----------
    station : tuple of float
        Axial positions, m, rising.
    value : tuple of float
        The quantity there, SI.
    """

    station: tuple[float, ...]
    value: tuple[float, ...]

    def at(self, x: ArrayLike) -> NDArray[np.float64]:
        """Return the value at ``x`` (m); same shape as ``x``."""
        return np.interp(np.asarray(x, dtype=float), self.station, self.value)

    @classmethod
    def constant(cls, value: float) -> AxialProfile:
        """Return a profile that is ``value`` everywhere."""
        return cls((0.0,), (value,))


@dataclass(frozen=True)
class Passage:
    """A gas or air passage along the axis: liner inside, outer or inner annulus.

    Parameters
    ----------
    side : {"liner", "outer", "inner"}
    area : AxialProfile
        Flow area of one can's passage, m2.
    hydraulic_diameter : AxialProfile
        4 area / wetted perimeter, m (liner: of the hot gas; annulus: twice the gap).
    """

    side: Literal["liner", "outer", "inner"]
    area: AxialProfile
    hydraulic_diameter: AxialProfile


@dataclass(frozen=True)
class LinerWall:
    """The sheet between hot gas and one annulus.

    Parameters
    ----------
    side : {"outer", "inner"}
    perimeter : AxialProfile
        Gas-side perimeter per can, m.
    beam_length : float
        Mean radiation path to this wall, m.
    thickness, conductivity : float
        Sheet, m and W/m/K.
    emissivity : float
        Gas-side and annulus-side emissivity of the sheet.
    casing_emissivity : float
    casing_area_ratio : float
        Liner outside area / casing inside area, for the grey enclosure.
    coating_thickness, coating_conductivity : float
        Thermal barrier coating; thickness 0 when there is none.
    """

    side: Literal["outer", "inner"]
    perimeter: AxialProfile
    beam_length: float
    thickness: float
    conductivity: float
    emissivity: float
    casing_emissivity: float
    casing_area_ratio: float
    coating_thickness: float = 0.0
    coating_conductivity: float = 1.0


@dataclass(frozen=True)
class Swirler:
    """Axial swirler vane pack; the opening that owns it carries the area."""

    hub_diameter: float
    tip_diameter: float
    vane_angle: float
    vane_count: int
    vane_thickness: float
    vane_loss: float


@dataclass(frozen=True)
class Slot:
    """Film-cooling slot lip; the opening that owns it carries the metering holes.

    ``height`` and ``lip_thickness`` in m, ``length`` is the developed slot length around
    the wall (perimeter at the slot), m.
    """

    height: float
    lip_thickness: float
    length: float


@dataclass(frozen=True)
class Opening:
    """One row of like openings through the metal.

    Parameters
    ----------
    name : str
        The user's own name; appears in every table.
    role : Role
    side : {"dome", "outer", "inner"}
        Which annulus feeds it; the dome is fed by the dump region.
    station : float
        Axial position of the row, m.
    count : int
        Openings in the row, per can.
    area : float
        Geometric area of ONE opening, m2: drilled hole; swirler passage normal to the axis,
        net of vane blockage; metering hole of a slot.
    edge : {"plain", "plunged", "swirler", "metering", "orifice"}
        Which discharge law applies.
    feed : {"total", "static"}
        Whether the annulus total or static pressure drives it.
    diameter : float or None
        Hole diameter, m, for round openings.
    discharge_coefficient : float or None
        Stated constant, referred to the driving pressure of ``feed``; None uses the law.
    effective_area : float or None
        Measured Cd x area of the whole row per can, m2; overrides area and coefficient.
    swirler, slot : the vane pack or film lip, where the opening has one.
    """

    name: str
    role: Role
    side: Side
    station: float
    count: int
    area: float
    edge: Edge
    feed: Feed
    diameter: float | None = None
    discharge_coefficient: float | None = None
    effective_area: float | None = None
    swirler: Swirler | None = None
    slot: Slot | None = None


@dataclass(frozen=True)
class Zone:
    """An axial stretch of the liner: ``name`` is primary, secondary or dilution."""

    name: Literal["primary", "secondary", "dilution"]
    start: float
    end: float

    @property
    def length(self) -> float:
        """Axial length, m."""
        return self.end - self.start


@dataclass(frozen=True)
class Diffuser:
    """Compressor exit to annulus.

    ``loss_coefficient`` is total-pressure loss over the inlet dynamic head (compressible,
    total minus static). Areas are for the whole machine, m2.
    """

    kind: Literal["faired", "dump"]
    inlet_area: float
    exit_area: float
    length: float
    loss_coefficient: float


@dataclass(frozen=True)
class Injector:
    """A fuel injector group: its share of the fuel and the openings that feed it air.

    ``premix_length`` (m) and ``premix_area`` (m2, all passages of one can) are those of the
    passage in which its fuel and air mix ahead of the dome; None where they meet in the flame.
    """

    name: str
    share: float
    openings: tuple[str, ...]
    premix_length: float | None = None
    premix_area: float | None = None


@dataclass(frozen=True)
class Hardware:
    """The whole combustor as metal.

    Parameters
    ----------
    layout, cans, flow : as in the case file; ``flow`` is "straight" or "reverse".
    reference_area : float
        Largest casing cross-section with the liner taken out, whole machine, m2.
    reference_height : float
        Casing diameter (can) or casing height (annular), m.
    liner_height : float
        Liner diameter (can) or liner height (annular), m.
    liner : Passage
    liner_length : float
        Dome face to liner exit, transition excluded, m.
    transition_length, exit_area : float
        Duct to the turbine: its length, and the flow area at its end per can.
    annuli : tuple of Passage
        Outer first; a can has one.
    walls : tuple of LinerWall
        One a side, same order as ``annuli``.
    diffuser : Diffuser
    openings : tuple of Opening
        Sorted by station.
    zones : tuple of Zone
        primary, secondary, dilution: contiguous, together the liner length.
    injectors : tuple of Injector
    roughness : float
        Wall roughness of the annulus, m.
    """

    layout: Layout
    cans: int
    flow: Literal["straight", "reverse"]
    reference_area: float
    reference_height: float
    liner_height: float
    liner: Passage
    liner_length: float
    transition_length: float
    exit_area: float
    annuli: tuple[Passage, ...]
    walls: tuple[LinerWall, ...]
    diffuser: Diffuser
    openings: tuple[Opening, ...]
    zones: tuple[Zone, ...]
    injectors: tuple[Injector, ...] = ()
    roughness: float = 1.5e-6

    def opening(self, name: str) -> Opening:
        """Return the opening called ``name``; KeyError when there is none."""
        for opening in self.openings:
            if opening.name == name:
                return opening
        raise KeyError(name)

    def volume(self, start: float, end: float) -> float:
        """Return the liner volume between two stations for the whole machine, m3."""
        inner = [x for x in self.liner.area.station if start < x < end]
        x = np.array([start, *inner, end])
        return float(np.trapezoid(self.liner.area.at(x), x)) * self.cans
