"""The air path of one machine at one inlet state, and its residuals for given flows.

Unknowns, as fractions: flow of every opening over the inlet flow; static pressure at the dome
face over the inlet total; where two annuli feed the dome of a reverse-flow machine, the outer
annulus's share of the dome air.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, field, replace

import numpy as np

from combustor.airflow import annulus, liner, openings
from combustor.airflow.annulus import AnnulusField, AnnulusGrid
from combustor.airflow.liner import GasProperties, LinerField, LinerGrid
from combustor.airflow.openings import OpeningLaws, OpeningState
from combustor.airflow.result import AnnulusHeat, Array, Inlet, LinerGas
from combustor.base.errors import InfeasibleError, InputError, Problem
from combustor.gasdynamics import dynamic_head, mach_from_flow_function
from combustor.hardware.metal import Hardware


@dataclass(frozen=True)
class Machine:
    """Grids, laws and inlet of one air split."""

    inlet: Inlet
    laws: OpeningLaws
    annuli: tuple[AnnulusGrid, ...]
    liner: LinerGrid
    gas: GasProperties
    dump_pressure: float
    inlet_mach: float
    reverse: bool

    @property
    def shares_dome(self) -> bool:
        """Whether two annuli feed the dome, so that the share is unknown."""
        dome = any(opening.side == "dome" for opening in self.laws.openings)
        return self.reverse and len(self.annuli) == 2 and dome

    @property
    def unknowns(self) -> int:
        """Number of unknowns."""
        return self.laws.count + 1 + int(self.shares_dome)


@dataclass
class Fields:
    """Everything along the axis in the latest sweep."""

    annuli: tuple[AnnulusField, ...]
    liner: LinerField
    openings: OpeningState | None = None
    dome_pressure: Array = field(default_factory=lambda: np.zeros(1))
    change: float = np.inf


def inlet_mach(hardware: Hardware, inlet: Inlet) -> float:
    """Return the Mach number at the diffuser inlet; InfeasibleError when it is choked."""
    passed = (
        inlet.mass_flow
        * np.sqrt(inlet.gas_constant * inlet.temperature / inlet.heat_capacity_ratio)
        / (hardware.diffuser.inlet_area * inlet.pressure)
    )
    mach = mach_from_flow_function(float(passed), inlet.heat_capacity_ratio)
    if not mach < 1.0:
        raise InfeasibleError(
            [
                f"the diffuser inlet has {hardware.diffuser.inlet_area:.4g} m2",
                f"{inlet.mass_flow:.4g} kg/s at {inlet.pressure:.4g} Pa and "
                f"{inlet.temperature:.4g} K would have to pass it faster than sound",
            ],
            "Check the compressor-exit annulus, or the flow and its pressure",
        )
    return mach


def build(
    hardware: Hardware,
    inlet: Inlet,
    liner_gas: LinerGas | None,
    annulus_heat: Sequence[AnnulusHeat],
    cells: int,
) -> Machine:
    """Return the machine to be solved."""
    _check(inlet)
    laws = openings.opening_laws(hardware)
    if laws.count == 0:
        raise InfeasibleError(["no row has an opening", "the air has no way into the liner"])
    end = max(hardware.liner_length, *(o.station for o in laws.openings))
    reverse = hardware.flow == "reverse"
    mach = inlet_mach(hardware, inlet)
    head = dynamic_head(mach, inlet.heat_capacity_ratio)
    dome = [i for i, o in enumerate(laws.openings) if o.side == "dome"]
    grids = tuple(
        annulus.annulus_grid(
            passage,
            reverse=reverse,
            cans=hardware.cans,
            end=end,
            cells=cells,
            roughness=hardware.roughness,
            openings=openings.stations(laws, passage.side),
            dome_openings=dome,
            count=laws.count,
            heats=[heat for heat in annulus_heat if heat.side == passage.side],
        )
        for passage in hardware.annuli
    )
    grid = liner.liner_grid(hardware, laws.openings, end, cells, liner_gas)
    return Machine(
        inlet=inlet,
        laws=laws,
        annuli=grids,
        liner=grid,
        gas=liner.gas_properties(grid, inlet, liner_gas),
        dump_pressure=inlet.pressure * (1.0 - hardware.diffuser.loss_coefficient * head),
        inlet_mach=mach,
        reverse=reverse,
    )


def _check(inlet: Inlet) -> None:
    problems = [
        Problem("not a positive number", "give an absolute value above 0", f"inlet {name}", value)
        for name, value in (
            ("mass_flow", inlet.mass_flow),
            ("pressure", inlet.pressure),
            ("temperature", inlet.temperature),
            ("gas_constant", inlet.gas_constant),
            ("heat_capacity_ratio - 1", inlet.heat_capacity_ratio - 1.0),
        )
        if not (np.isfinite(value) and value > 0.0)
    ]
    if problems:
        raise InputError(problems)


def resting_fields(machine: Machine, head_pressure: float) -> Fields:
    """Return fields without flow, to start from."""
    inlet, grid = machine.inlet, machine.liner
    temperature = machine.gas.temperature
    if temperature is None:
        temperature = np.full(grid.station.size, inlet.temperature)
    level = np.full(grid.station.size, head_pressure)
    return Fields(
        annuli=tuple(annulus.rest(a, inlet, machine.dump_pressure) for a in machine.annuli),
        liner=LinerField(0.0 * level, level, 0.0 * level, temperature),
    )


def evaluate(machine: Machine, states: Array, fields: Fields, sweeps: int) -> tuple[Array, Fields]:
    """Return residuals and fields for several states at once.

    Parameters
    ----------
    machine : Machine
    states : ndarray
        (state, unknown).
    fields : Fields
        Latest sweep, of one state or of as many as ``states``.
    sweeps : int
        Sweeps through annuli, openings and liner.

    Returns
    -------
    (ndarray, Fields)
        Residuals (state, unknown), dimensionless, and the fields of every state.
    """
    count = machine.laws.count
    flow = states[:, :count] * machine.inlet.mass_flow
    head_pressure = states[:, count] * machine.inlet.pressure
    share = states[:, count + 1 :]
    air = tuple(
        _air(machine, number, latest, _annulus_flow(machine, number, flow, share), sweeps)
        for number, latest in enumerate(fields.annuli)
    )
    dome_pressure, dome_temperature, dome_gap = _dome_feed(machine, air, flow, share)

    def openings_at(gas: LinerField) -> OpeningState:
        return _openings(machine, air, gas, flow, dome_pressure, dome_temperature)

    passage = _shifted(fields.liner, head_pressure)
    state = openings_at(passage)
    for _ in range(sweeps):
        latest = passage
        passage = _liner(machine, latest, state, flow, head_pressure)
        state = openings_at(passage)
    change = float(np.max(np.abs(passage.static_pressure - latest.static_pressure)))
    fields = Fields(air, passage, state, dome_pressure, change / machine.inlet.pressure)
    inlet_flow = machine.inlet.mass_flow
    residual = np.concatenate(
        [
            (flow - state.law_flow) / inlet_flow,
            states[:, :count].sum(axis=1, keepdims=True) - 1.0,
            dome_gap / (0.05 * machine.inlet.pressure),
        ],
        axis=1,
    )
    return residual, fields


def _air(
    machine: Machine, number: int, latest: AnnulusField, mass_flow: Array, sweeps: int
) -> AnnulusField:
    grid, inlet = machine.annuli[number], machine.inlet
    temperature = annulus.temperature_along(grid, inlet, mass_flow)
    friction = annulus.friction_along(grid, mass_flow, temperature)
    for _ in range(sweeps):
        latest = annulus.sweep(
            grid,
            inlet,
            entry_pressure=machine.dump_pressure,
            mass_flow=mass_flow,
            temperature=temperature,
            friction=friction,
            static_pressure=latest.static_pressure,
        )
    return latest


def _shifted(latest: LinerField, head_pressure: Array) -> LinerField:
    """Return the latest liner moved as a whole to the wanted pressure at the dome face."""
    pressure = latest.static_pressure
    return replace(latest, static_pressure=pressure + (head_pressure - pressure[..., 0])[..., None])


def _annulus_flow(machine: Machine, number: int, flow: Array, share: Array) -> Array:
    grid = machine.annuli[number]
    along = flow @ grid.draws
    if grid.dome_draw is None:
        return along
    dome = flow @ grid.dome_draw
    if machine.shares_dome:
        part = share[:, 0] if number == 0 else 1.0 - share[:, 0]
        return along + (part * dome)[:, None]
    # Without openings in the dome the last stretch stands still; two annuli then share nothing.
    return along + dome[:, None]


def _dome_feed(
    machine: Machine, annuli: Sequence[AnnulusField], flow: Array, share: Array
) -> tuple[Array, Array, Array]:
    """Return total pressure and temperature that feed the dome, and the annuli's disagreement."""
    states = flow.shape[0]
    none = np.zeros((states, 0))
    if not machine.reverse or not annuli:
        pressure = np.full(states, machine.dump_pressure)
        return pressure, np.full(states, machine.inlet.temperature), none
    ends = []
    for side in annuli:
        total = side.total_pressure[..., -1]
        head = total - side.static_pressure[..., -1]
        ends.append(total - annulus.TURNING_LOSS * head)
    temperatures = [
        np.broadcast_to(np.atleast_1d(side.temperature[..., -1]), (states,)) for side in annuli
    ]
    if not machine.shares_dome:
        return ends[0], temperatures[0], none
    part = share[:, 0]
    mixed = part * temperatures[0] + (1.0 - part) * temperatures[1]
    return ends[0], mixed, (ends[0] - ends[1])[:, None]


def _openings(
    machine: Machine,
    annuli: Sequence[AnnulusField],
    gas: LinerField,
    flow: Array,
    dome_pressure: Array,
    dome_temperature: Array,
) -> OpeningState:
    shape = flow.shape
    total = np.repeat(dome_pressure[:, None], shape[1], axis=1)
    static = total.copy()
    temperature = np.repeat(dome_temperature[:, None], shape[1], axis=1)
    upstream_flow = np.full(shape, np.inf)
    for grid, side in zip(machine.annuli, annuli, strict=True):
        row, node = grid.row, grid.node
        total[:, row] = side.total_pressure[..., node]
        static[:, row] = side.static_pressure[..., node]
        temperature[:, row] = side.temperature[..., node]
        upstream_flow[:, row] = side.mass_flow[..., node]
    return openings.opening_state(
        machine.laws,
        machine.inlet,
        mass_flow=flow,
        annulus_flow=upstream_flow,
        total_pressure=total,
        static_pressure=static,
        temperature=temperature,
        liner_pressure=gas.static_pressure[..., machine.liner.upstream],
    )


def _liner(
    machine: Machine,
    latest: LinerField,
    state: OpeningState,
    flow: Array,
    head_pressure: Array,
) -> LinerField:
    temperature = machine.gas.temperature
    if temperature is None:
        temperature = latest.temperature
        if any(grid.heat is not None for grid in machine.annuli):
            temperature = liner.unfired_temperature(machine.liner, flow, state.temperature)
    return liner.sweep(
        machine.liner,
        machine.gas,
        static_pressure=latest.static_pressure,
        head_pressure=head_pressure,
        opening_flow=flow,
        axial_momentum=flow * state.velocity * state.axial,
        temperature=temperature,
    )


def single(fields: Fields) -> Fields:
    """Return the fields of the first of several states."""

    def row(values: Array) -> Array:
        return values[0] if values.ndim == 2 else values

    state = fields.openings
    return Fields(
        annuli=tuple(
            AnnulusField(**{name: row(value) for name, value in vars(side).items()})
            for side in fields.annuli
        ),
        liner=LinerField(**{name: row(value) for name, value in vars(fields.liner).items()}),
        openings=None
        if state is None
        else OpeningState(**{name: row(value) for name, value in vars(state).items()}),
        dome_pressure=fields.dome_pressure[:1],
        change=fields.change,
    )
