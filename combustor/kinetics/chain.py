"""The chain: primary zone, then cells downstream in flow order, each from the one before."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace

import numpy as np
from numpy.typing import NDArray

from combustor.base.convergence import Convergence
from combustor.base.errors import InputError, Problem
from combustor.base.method import Method, Notice
from combustor.fuel.gas import Gas, GasState
from combustor.kinetics.balances import balances
from combustor.kinetics.branch import Solved, Status, hold, solve
from combustor.kinetics.near_wall import entered, left, parted, together
from combustor.kinetics.primary import PrimaryZone, distribution_of, fresh_bundle, primary_zone
from combustor.kinetics.record import Cell, Chain, Part, Station
from combustor.kinetics.streams import Bundle
from combustor.kinetics.tear import Tear
from combustor.kinetics.unmixedness import STREAMS_BY_SQUARE_ROOT, Distribution
from combustor.kinetics.zone import GAS_CONSTANT, Zone, ZoneState

Array = NDArray[np.float64]

EXCHANGE_WITH_THE_MEAN = Method(
    key="exchange-with-the-mean",
    quantity="mixing of the streams downstream of the primary zone",
    source="interaction by exchange with the mean, Villermaux and Devillon (1972); exact over "
    "each cell's residence time",
    reading="from memory",
)
MOST_RETURNS = 60  # passes around a recirculation that spans several cells


def burn(
    gas: Gas,
    pressure: float,
    primary: PrimaryZone,
    cells: Sequence[Cell],
    warm: Chain | None = None,
    heat_losses: Sequence[float] | None = None,
) -> Chain:
    """Burn the fuel down the chain.

    Parameters
    ----------
    gas : Gas
    pressure : float
        One value for the whole chain [Pa]
    primary : PrimaryZone
    cells : sequence of Cell
        In flow order.
    warm : Chain, optional
        A neighbouring solution with the same number of streams and cells. It saves time only.
    heat_losses : sequence of float, optional
        Of the primary zone and of each cell [W]

    Returns
    -------
    Chain

    Raises
    ------
    InputError
        A flow, volume or width that cannot be.
    """
    losses = [0.0] * (len(cells) + 1) if heat_losses is None else list(heat_losses)
    if len(losses) != len(cells) + 1:
        raise InputError(
            Problem(
                "one heat loss for the primary zone and one for each cell are needed",
                f"{len(cells) + 1} values",
                "heat_losses",
                len(losses),
            )
        )
    distribution = distribution_of(primary)
    return _Pass(gas, pressure, primary, tuple(cells), losses, distribution).run(warm)


class _Pass:
    """One solve of a chain: what stays the same from cell to cell."""

    def __init__(
        self,
        gas: Gas,
        pressure: float,
        primary: PrimaryZone,
        cells: tuple[Cell, ...],
        losses: list[float],
        distribution: Distribution,
    ) -> None:
        self.gas = gas
        self.pressure = pressure
        self.primary = primary
        self.cells = cells
        self.losses = losses
        self.distribution = distribution
        self.fresh = fresh_bundle(gas, primary, distribution)
        self.solved: list[Solved] = []
        self.zones: list[Zone] = []
        self.iterations = 0
        self.beside: Bundle | None = None
        self.guesses: list[ZoneState | None] = [None] * (len(cells) + 1)

    def run(self, warm: Chain | None) -> Chain:
        if warm is not None and _fits(warm, self.distribution, self.cells):
            self.guesses = list(warm.states)
        returning = [place for place, cell in enumerate(self.cells) if cell.returned > 0.0]
        loop_end = returning[-1] + 1 if returning else 0
        tear = None
        closed = True
        if returning:
            tear, bundle, closed = self._close(loop_end, warm)
        else:
            bundle = self._solve_primary(self.fresh)
        if self.solved[0].status == "burning":
            for place in range(loop_end, len(self.cells)):
                bundle = self._solve_cell(place, bundle)
        return self._chain(bundle, tear, closed)

    # -- one cell after the other ------------------------------------------------------------

    def _solve_primary(self, fresh: Bundle) -> Bundle:
        self.beside = None
        zone = primary_zone(self.gas, self.pressure, self.primary, fresh, self.losses[0])
        return self._solve_zone(0, zone)

    def _solve_cell(self, place: int, bundle: Bundle) -> Bundle:
        cell = self.cells[place]
        molar_masses = self.gas.rates.molar_masses
        core, beside = entered(bundle, self.beside, cell.beside, molar_masses)
        bundle = together(core.joined_by(cell.air, molar_masses), beside)
        zone = Zone(
            gas=self.gas,
            pressure=self.pressure,
            flows=bundle.flows,
            moles=bundle.moles,
            enthalpies=bundle.enthalpies,
            volume=cell.volume,
            mixing=cell.mixing,
            heat_loss=self.losses[place + 1],
            apart=0 if beside is None else 1,
        )
        guess = self.guesses[place + 1]
        if guess is None or len(guess.moles) != zone.streams:
            self.guesses[place + 1] = _as_it_enters(zone)
        bundle, self.beside = parted(self._solve_zone(place + 1, zone), zone.apart)
        if self.beside is not None:
            bundle, self.beside = left(bundle, self.beside, cell.beside.returned)
        return bundle.drawn(cell.returned) if cell.returned > 0.0 else bundle

    def _solve_zone(self, place: int, zone: Zone) -> Bundle:
        solved = (solve if place > 0 else hold)(zone, self.guesses[place])
        del self.solved[place:], self.zones[place:]
        self.solved.append(solved)
        self.zones.append(zone)
        self.iterations += solved.iterations
        self.guesses[place] = solved.state
        masses = solved.state.moles * self.gas.rates.molar_masses
        enthalpies = [
            self.gas.enthalpy(float(temperature), self.pressure, fractions)
            for temperature, fractions in zip(solved.state.temperatures, masses, strict=True)
        ]
        return Bundle(zone.flows, solved.state.moles, np.array(enthalpies))

    # -- recirculation over several cells ----------------------------------------------------

    def _close(self, loop_end: int, warm: Chain | None) -> tuple[Array, Bundle, bool]:
        """Solve the cells of a recirculation together: what is drawn back is what comes in."""
        flow = sum(cell.returned for cell in self.cells)
        start = warm.return_state if warm is not None else None
        tear = Tear(self._first_return(loop_end) if start is None else start)
        bundle = self.fresh
        for _ in range(MOST_RETURNS):
            guess = tear.value
            bundle = self._solve_primary(self.fresh.joined(flow, guess[:-1], float(guess[-1])))
            if self.solved[0].status != "burning":
                return guess, bundle, self.solved[0].status == "blown_out"
            back = np.zeros_like(guess)
            for place in range(loop_end):
                bundle = self._solve_cell(place, bundle)
                part = self.cells[place].returned / flow
                back += part * np.append(bundle.mean_moles, bundle.mean_enthalpy)
            if tear.closed_by(back):
                return guess, bundle, True
        return guess, bundle, False

    def _first_return(self, loop_end: int) -> Array:
        """Return the equilibrium of everything that enters up to the last cell drawn from."""
        bundle = self.fresh
        for cell in self.cells[:loop_end]:
            bundle = bundle.joined_by(cell.air, self.gas.rates.molar_masses)
        enthalpy = bundle.mean_enthalpy - sum(self.losses[: loop_end + 1]) / bundle.total_flow
        masses = bundle.mean_moles * self.gas.rates.molar_masses
        state = self.gas.equilibrium(enthalpy, self.pressure, masses)
        return np.append(state.mass_fractions / self.gas.rates.molar_masses, enthalpy)

    # -- what came out -----------------------------------------------------------------------

    def _chain(self, bundle: Bundle, tear: Array | None, closed: bool) -> Chain:
        status: Status = self.solved[0].status
        if status == "burning" and (
            not closed or any(solved.status == "not_converged" for solved in self.solved)
        ):
            status = "not_converged"
        stations = tuple(self._station(place) for place in range(len(self.solved)))
        leaving, closing = None, None
        if status == "burning":
            everything = together(bundle, self.beside)
            leaving = self._mixed(everything.mean_moles, everything.mean_enthalpy)
            inflows = [self.primary.fuel, self.primary.air]
            inflows += [s for cell in self.cells for s in (*cell.air, *cell.beside.air)]
            closing = balances(self.gas, self.primary.fuel, inflows, everything, sum(self.losses))
        return Chain(
            status=status,
            stations=stations,
            distribution=self.distribution,
            exit=leaving,
            balances=closing,
            convergence=self._convergence(status, closed),
            notices=self._notices(),
            states=tuple(solved.state for solved in self.solved),
            return_state=tear,
        )

    def _convergence(self, status: Status, closed: bool) -> Convergence:
        worst = max(solved.step for solved in self.solved)
        message = ""
        if status == "not_converged":
            names = ["primary", *(cell.name for cell in self.cells)]
            failed = [
                names[place]
                for place, solved in enumerate(self.solved)
                if solved.status == "not_converged"
            ]
            message = "no steady state found in " + ", ".join(failed) if failed else ""
            if not closed and not failed:
                message = "the recirculation over several cells did not close"
        return Convergence(status != "not_converged", worst, self.iterations, message)

    def _notices(self) -> tuple[Notice, ...]:
        asked, got = self.primary.unmixedness, self.distribution.unmixedness
        if abs(got - asked) <= 0.01 * asked:
            return ()
        return (
            Notice(STREAMS_BY_SQUARE_ROOT.key, "unmixedness asked for", asked, 0.0, got, "primary"),
        )

    def _station(self, place: int) -> Station:
        zone, solved = self.zones[place], self.solved[place]
        state = solved.state
        cell = self.cells[place - 1] if place > 0 else None
        mixed = self._mixed(zone.shares @ state.moles, zone.exit_enthalpy)
        volume = self.primary.volume if cell is None else cell.volume
        specific = zone.throughflow_volume(state)
        few = zone.exchanging
        return Station(
            name="primary" if cell is None else cell.name,
            start=0.0 if cell is None else cell.start,
            end=self.primary.end if cell is None else cell.end,
            mass_flow=zone.total_flow,
            temperature=mixed.temperature,
            mass_fractions=mixed.mass_fractions,
            density=1.0 / specific,
            core=self._part(zone, state, slice(None, few)),
            beside=None if zone.apart == 0 else self._part(zone, state, slice(few, None)),
            residence_time=volume / (zone.total_flow * specific),
            stream_temperatures=state.temperatures[:few],
            stream_shares=zone.flows[:few] / zone.flows[:few].sum(),
            burning=solved.burning[:few],
        )

    def _part(self, zone: Zone, state: ZoneState, which: slice) -> Part:
        """Return some of a zone's streams, mixed."""
        flows, moles = zone.flows[which], state.moles[which]
        masses = moles * self.gas.rates.molar_masses
        temperatures = state.temperatures[which]
        enthalpies = [
            self.gas.enthalpy(float(temperature), self.pressure, fractions)
            for temperature, fractions in zip(temperatures, masses, strict=True)
        ]
        bundle = Bundle(flows, moles, np.array(enthalpies))
        mixed = self._mixed(bundle.mean_moles, bundle.mean_enthalpy)
        volume = float(flows @ (temperatures * moles.sum(axis=1))) * GAS_CONSTANT / self.pressure
        return Part(
            mass_flow=bundle.total_flow,
            temperature=mixed.temperature,
            mass_fractions=mixed.mass_fractions,
            density=bundle.total_flow / volume,
        )

    def _mixed(self, moles: Array, enthalpy: float) -> GasState:
        # The last Newton step may leave -1e-15 kmol/kg of a species that is not there.
        masses = np.maximum(moles * self.gas.rates.molar_masses, 0.0)
        temperature = self.gas.temperature(enthalpy, self.pressure, masses)
        return GasState(temperature, self.pressure, masses, enthalpy)


def _as_it_enters(zone: Zone) -> ZoneState:
    """Return the state of a cell in which nothing has happened yet."""
    gas, masses = zone.gas, zone.gas.rates.molar_masses
    temperatures = np.array(
        [
            gas.temperature(float(enthalpy), zone.pressure, moles * masses, 1500.0)
            for enthalpy, moles in zip(
                zone.enthalpies - zone.loss_per_pass, zone.moles, strict=True
            )
        ]
    )
    state = ZoneState(zone.moles, temperatures, 1.0)
    return replace(state, rate=zone.throughflow_rate(zone.throughflow_volume(state)))


def _fits(warm: Chain, distribution: Distribution, cells: tuple[Cell, ...]) -> bool:
    same_cells = len(warm.states) == len(cells) + 1
    return same_cells and len(warm.distribution.shares) == len(distribution.shares)
