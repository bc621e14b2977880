"""Settings of the chain and the coupled solve, each with its reason in one place."""

from __future__ import annotations

from dataclasses import dataclass

from combustor.base.method import Method
from combustor.case.schema import Model

UNMIXEDNESS = Method(
    key="unmixedness-default",
    quantity="standard deviation of mixture fraction over its mean in the primary zone",
    source="Heywood & Mikus 1973, AGARD CP-125: 0.2-0.4 for conventional primaries at high power",
    reading="from memory",
    validity={"unmixedness": (0.0, 0.6)},
    scatter="the calibration parameter of a machine; 0.2 to 0.6 seen",
    note="upper end of the high-power range taken for a gas diffusion front end",
)
RECIRCULATION = Method(
    key="recirculation-default",
    quantity="recirculated mass over fresh mass in the primary zone",
    source="swirl and half of the primary jets turn products upstream at about the fresh flow",
    reading="judgement",
    validity={"recirculation": (0.0, 3.0)},
    scatter="0.5 to 1.5 plausible; published recirculation data differ by more",
)
MIXING = Method(
    key="mixing-default",
    quantity="rate at which streams mix towards their mean downstream of the primary zone",
    source="turbulent velocity 0.15 of the jet velocity over a quarter of the liner height",
    reading="judgement",
    scatter="factor 2",
    note="form of Heywood & Mikus 1973 (decay time = mixing length / turbulent velocity)",
)
JET_MIXING_LENGTH = Method(
    key="jet-mixing-length",
    quantity="axial length over which a row's air joins the core",
    source="half a liner height after the row, cut at the zone's end",
    reading="judgement",
    scatter="factor 2",
    note="jets at their best spacing are largely mixed within one duct height",
)

JET_VELOCITY_SHARE = 0.15
MIXING_LENGTH_SHARE = 0.25
JET_LENGTH_SHARE = 0.5


@dataclass(frozen=True)
class Settings:
    """What the chain and the coupled solve need to know beside metal and operating point.

    Parameters
    ----------
    unmixedness, recirculation : float
        Fractions as defined for the case file.
    mixing : float or None
        Exchange rate, 1/s; None takes it from jet velocity and liner height.
    streams : int
        Parallel streams in the core.
    secondary_cells, dilution_cells, transition_cells : int
        Stirred cells along each stretch; twice as many move NOx by less than 2 %.
    primary_jet_share : float
        Share of the primary-row air that turns upstream.
    wall_stations : int
        Stations of the wall march a side.
    casing_loss_coefficient : float or None
        Casing to its surroundings, W/m2/K; None loses nothing, as under a good lagging.
    tolerance : float
        Largest change of any opening's flow over the inlet air between two passes.
    temperature_tolerance : float
        Largest change of the exit temperature between two passes, K.
    passes : int
        Most passes before the point is called not converged.
    is_unmixedness_stated : bool
        The case's own width holds for every injector; else a premixed one has its own default.
    """

    unmixedness: float = 0.4
    recirculation: float = 1.0
    mixing: float | None = None
    streams: int = 9
    secondary_cells: int = 6
    dilution_cells: int = 6
    transition_cells: int = 1
    primary_jet_share: float = 0.5
    wall_stations: int = 60
    casing_loss_coefficient: float | None = None
    tolerance: float = 1e-5
    temperature_tolerance: float = 0.05
    passes: int = 25
    is_unmixedness_stated: bool = False


def settings_of(model: Model) -> Settings:
    """Return the settings a case states, with the documented default where it is silent."""
    default = Settings()
    cells = model.cells

    def stated(value: float | None, fallback: float) -> float:
        return fallback if value is None else value

    return Settings(
        unmixedness=stated(model.unmixedness, default.unmixedness),
        recirculation=stated(model.recirculation, default.recirculation),
        mixing=model.mixing,
        streams=int(stated(model.streams, default.streams)),
        secondary_cells=default.secondary_cells if cells is None else cells,
        dilution_cells=default.dilution_cells if cells is None else cells,
        primary_jet_share=model.primary_jet_share,
        wall_stations=int(stated(model.wall_stations, default.wall_stations)),
        casing_loss_coefficient=model.casing_loss_coefficient,
        is_unmixedness_stated=model.unmixedness is not None,
    )
