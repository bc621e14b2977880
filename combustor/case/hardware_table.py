"""``[hardware]``: the metal as it stands in a case file.

Diameters are what a person edits; areas, perimeters and heights that follow from them are
left out and worked out when the metal is built. Each can be stated to override that.
"""

from __future__ import annotations

from typing import Literal

from pydantic import BaseModel, ConfigDict, Field, StrictBool

from combustor.case import kinds as k

Role = Literal[
    "swirler", "premixer", "dome", "primary", "secondary", "dilution", "film", "effusion", "leak"
]
Side = Literal["dome", "outer", "inner"]
Edge = Literal["plain", "plunged", "swirler", "metering", "orifice"]
Feed = Literal["total", "static"]


class Table(BaseModel):
    """A table of the case file: frozen, no key beyond those named."""

    model_config = ConfigDict(extra="forbid", frozen=True)


class PassageTable(Table):
    """A passage along the axis, per can; one value, or one a ``station`` (m).

    ``diameter`` for a round passage; ``outer_diameter`` and ``inner_diameter`` for a ring;
    ``area`` (m2) and ``hydraulic_diameter`` for anything else.
    """

    station: k.Stations | None = None
    diameter: k.Diameters | None = None
    outer_diameter: k.Diameters | None = None
    inner_diameter: k.InnerDiameters | None = None
    area: k.Areas | None = None
    hydraulic_diameter: k.Diameters | None = None


class LinerTable(PassageTable):
    """The hot-gas passage; ``runs_to_exit`` carries it on through the transition duct."""

    runs_to_exit: StrictBool = False


class AnnulusTable(PassageTable):
    """One annulus between liner and casing."""

    side: Literal["outer", "inner"] = "outer"


class WallTable(Table):
    """The sheet on one side; m, W/m/K. ``perimeter`` as a passage, one a ``station``."""

    side: Literal["outer", "inner"] = "outer"
    thickness: k.Thickness
    conductivity: k.Conductivity = 26.0
    emissivity: k.Emissivity = 0.8
    casing_emissivity: k.Emissivity = 0.7
    coating_thickness: k.CoatingThickness = 0.0
    coating_conductivity: k.Conductivity = 1.0
    beam_length: k.Length | None = None
    casing_area_ratio: k.CasingRatio | None = None
    station: k.Stations | None = None
    perimeter: k.Lengths | None = None


class DiffuserTable(Table):
    """Compressor exit to annulus; areas for the whole machine, m2.

    ``loss_coefficient`` is total-pressure loss over the inlet dynamic head. ``inlet_area``
    follows from ``[combustor] inlet_annulus`` when left out.
    """

    kind: Literal["faired", "dump"]
    inlet_area: k.Area | None = None
    exit_area: k.Area
    length: k.DuctLength
    loss_coefficient: k.LossCoefficient


class ZonesTable(Table):
    """Where the primary and the secondary zone end, m from the dome face."""

    primary_end: k.Station
    secondary_end: k.Station


class SwirlerTable(Table):
    """Axial vane pack; m, rad. ``vane_loss`` is 1.3 for flat, 1.15 for curved vanes."""

    hub_diameter: k.HubDiameter
    tip_diameter: k.Diameter
    vane_angle: k.VaneAngle
    vane_count: k.Vanes
    vane_thickness: k.Thickness
    vane_loss: k.LossCoefficient = 1.3


class SlotTable(Table):
    """Film slot lip, m; ``length`` (around the wall) follows from the perimeter there."""

    height: k.SlotHeight
    lip_thickness: k.Thickness
    length: k.Length | None = None


class OpeningTable(Table):
    """One row of like openings; ``x`` in m from the dome face, ``count`` per can.

    Size is one of ``diameter`` (round), ``swirler`` (ring less vanes) or ``area`` (one
    opening, m2). ``effective_area`` is the measured Cd x area of the whole row per can.
    """

    name: k.Name
    role: Role
    side: Side | None = None
    x: k.Station = 0.0
    count: k.Count = 1
    diameter: k.HoleDiameter | None = None
    area: k.Area | None = None
    effective_area: k.EffectiveArea | None = None
    edge: Edge | None = None
    feed: Feed | None = None
    discharge_coefficient: k.DischargeCoefficient | None = None
    swirler: SwirlerTable | None = None
    slot: SlotTable | None = None


class InjectorTable(Table):
    """A fuel injector group: share of the fuel, and the openings that feed it air.

    ``premix_length`` (m) and ``premix_area`` (m2, all passages of one can) where fuel and air
    mix ahead of the dome.
    """

    name: k.Name
    share: k.Share = 1.0
    openings: tuple[k.Name, ...] = ()
    premix_length: k.Length | None = None
    premix_area: k.Area | None = None


class HardwareTable(Table):
    """The metal of one can (an annular machine has one), m and m2."""

    liner_length: k.Length
    liner_height: k.Diameter | None = None
    reference_area: k.Area | None = None
    reference_height: k.Diameter | None = None
    exit_area: k.Area | None = None
    transition_length: k.DuctLength | None = None
    roughness: k.Roughness = 1.5e-6
    liner: LinerTable
    annuli: tuple[AnnulusTable, ...] = Field(min_length=1, max_length=2)
    walls: tuple[WallTable, ...] = Field(min_length=1, max_length=2)
    diffuser: DiffuserTable
    zones: ZonesTable
    openings: tuple[OpeningTable, ...] = Field(min_length=1)
    injectors: tuple[InjectorTable, ...] = ()
