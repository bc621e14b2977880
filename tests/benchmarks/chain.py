"""The product's chain against plain Cantera on the same reactors, in the same run.

Methane and air, one well-mixed stream, side air in every reactor, one recirculation from the
second reactor back into the first. The plain ways: ideal-gas reactors in one network marched to
steady state with default tolerances, and mole reactors with the adaptive preconditioner.

    python tests/benchmarks/chain.py --reactors 20 --json
"""

from __future__ import annotations

import argparse
import json
import statistics
import sys
import time
from dataclasses import dataclass

import cantera as ct
import numpy as np

from combustor.fuel.gas import Gas
from combustor.kinetics.chain import Cell, Chain, burn
from combustor.kinetics.primary import PrimaryZone
from combustor.kinetics.streams import Stream

PRESSURE = 20e5  # Pa
AIR_TEMPERATURE = 700.0  # K
FUEL_TEMPERATURE = 300.0  # K
FIRST_AIR = 0.3  # kg/s into the first reactor
SIDE_AIR = 0.7  # kg/s, shared evenly by all the others
FUEL = 0.0157  # kg/s, equivalence ratio 0.9 in the first reactor
RETURNED = 0.2  # kg/s from the second reactor into the first
RESIDENCE_VOLUME = 2.5e-3  # m3, whole chain
MECHANISM = "gri30.yaml"

# Of the plain networks' outflows [kg/s/Pa]: where the preconditioned one is fastest, at 5 and at 20
# reactors. Three times more or less costs it 1.3 to 4 times as long, thirty times more 400 times;
# marching does not mind, and the answer stays the same.
PRESSURE_GAIN = 3e-7


@dataclass(frozen=True)
class Answer:
    """Temperatures [K] and NO mole fractions of every reactor, and the time it took [s]."""

    temperatures: np.ndarray
    nitric_oxide: np.ndarray
    seconds: float


def side_air(reactors: int) -> float:
    return SIDE_AIR / (reactors - 1)


def product_inputs(gas: Gas, reactors: int) -> tuple[PrimaryZone, list[Cell]]:
    fuel = gas.from_mole_fractions({"CH4": 1.0})
    air = gas.air(humidity=0.0)
    hot = gas.enthalpy(AIR_TEMPERATURE, PRESSURE, air)
    volume = RESIDENCE_VOLUME / reactors
    primary = PrimaryZone(
        fuel=Stream(FUEL, gas.enthalpy(FUEL_TEMPERATURE, PRESSURE, fuel), fuel),
        air=Stream(FIRST_AIR, hot, air),
        volume=volume,
        unmixedness=0.0,
        recirculation=0.0,
    )
    cells = [
        Cell(
            name=f"reactor {place + 1}",
            volume=volume,
            start=float(place),
            end=float(place + 1),
            air=(Stream(side_air(reactors), hot, air),),
            returned=RETURNED if place == 1 else 0.0,
        )
        for place in range(1, reactors)
    ]
    return primary, cells


def product(gas: Gas, reactors: int, repeats: int = 3) -> Answer:
    primary, cells = product_inputs(gas, reactors)
    seconds = []
    chain: Chain | None = None
    for _ in range(repeats):
        begin = time.perf_counter()
        chain = burn(gas, PRESSURE, primary, cells)
        seconds.append(time.perf_counter() - begin)
    assert chain is not None
    if chain.status != "burning":
        raise SystemExit(f"the product's chain is {chain.status}: {chain.convergence.message}")
    fractions = np.array([gas.mole_fractions(masses) for masses in chain.mass_fractions])
    return Answer(chain.temperatures, fractions[:, gas.index("NO")], statistics.median(seconds))


def plain(reactors: int, kind: type, preconditioned: bool) -> Answer:
    begin = time.perf_counter()
    gas = Gas.load(MECHANISM)
    solution = gas.solution
    air_state = (AIR_TEMPERATURE, PRESSURE, gas.air(humidity=0.0))
    fuel_state = (FUEL_TEMPERATURE, PRESSURE, gas.from_mole_fractions({"CH4": 1.0}))

    def reservoir(state: tuple[float, float, np.ndarray]) -> ct.Reservoir:
        solution.TPY = state
        return ct.Reservoir(solution, clone=True)

    air_tank, fuel_tank, exhaust = reservoir(air_state), reservoir(fuel_state), None
    exhaust = reservoir(air_state)
    devices, chain = [], []
    through = FUEL + FIRST_AIR + RETURNED
    fuel_so_far, air_so_far = FUEL, FIRST_AIR
    flows = []
    for place in range(reactors):
        if place > 0:
            air_so_far += side_air(reactors)
            through += side_air(reactors)
        total = fuel_so_far + air_so_far
        mixture = (fuel_so_far * fuel_state[2] + air_so_far * air_state[2]) / total
        solution.TPY = fuel_state
        enthalpy = fuel_so_far * solution.enthalpy_mass
        solution.TPY = air_state
        enthalpy = (enthalpy + air_so_far * solution.enthalpy_mass) / total
        solution.TPY = AIR_TEMPERATURE, PRESSURE, mixture
        solution.HP = enthalpy, PRESSURE
        solution.equilibrate("HP")
        chain.append(kind(solution, volume=RESIDENCE_VOLUME / reactors, clone=True))
        if place == 1:
            through -= RETURNED
        flows.append(through)
    devices.append(ct.MassFlowController(fuel_tank, chain[0], mdot=FUEL))
    devices.append(ct.MassFlowController(air_tank, chain[0], mdot=FIRST_AIR))
    devices.append(ct.MassFlowController(chain[1], chain[0], mdot=RETURNED))
    for place in range(reactors):
        if place > 0:
            device = ct.MassFlowController(air_tank, chain[place], mdot=side_air(reactors))
            devices.append(device)
        # A pressure controller follows one primary flow; this one carries the exact sum.
        measure = ct.MassFlowController(air_tank, fuel_tank, mdot=flows[place])
        downstream = chain[place + 1] if place + 1 < reactors else exhaust
        devices += [
            measure,
            ct.PressureController(chain[place], downstream, primary=measure, K=PRESSURE_GAIN),
        ]
    network = ct.ReactorNet(chain)
    if preconditioned:
        network.preconditioner = ct.AdaptivePreconditioner()
    network.advance_to_steady_state()
    temperatures = np.array([reactor.phase.T for reactor in chain])
    nitric_oxide = np.array([reactor.phase["NO"].X[0] for reactor in chain])
    pressures = np.array([reactor.phase.P for reactor in chain])
    if np.max(np.abs(pressures / PRESSURE - 1.0)) > 1e-4:
        raise SystemExit("plain Cantera did not hold the pressure; the comparison would not count")
    return Answer(temperatures, nitric_oxide, time.perf_counter() - begin)


def compare(reactors: int, marching: bool = True) -> dict[str, float]:
    gas = Gas.load(MECHANISM)
    product(gas, reactors, repeats=1)
    ours = product(gas, reactors)
    others = {"preconditioned": plain(reactors, ct.IdealGasMoleReactor, preconditioned=True)}
    if marching:
        others["marched"] = plain(reactors, ct.IdealGasReactor, preconditioned=False)
    report: dict[str, float] = {"reactors": reactors, "seconds": ours.seconds}
    for name, other in others.items():
        report[f"seconds_{name}"] = other.seconds
        report[f"speedup_{name}"] = other.seconds / ours.seconds
    report["speedup"] = min(other.seconds for other in others.values()) / ours.seconds
    report["max_temperature_difference_K"] = max(
        float(np.max(np.abs(other.temperatures - ours.temperatures))) for other in others.values()
    )
    report["max_nox_difference_percent"] = 100.0 * max(
        float(np.max(np.abs(other.nitric_oxide / ours.nitric_oxide - 1.0)))
        for other in others.values()
    )
    return report


def main(arguments: list[str] | None = None) -> int:
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("--reactors", type=int, default=20, help="at least 3")
    parser.add_argument("--json", action="store_true", help="one JSON document")
    options = parser.parse_args(arguments)
    if options.reactors < 3:
        parser.error("--reactors: at least 3 are needed for the recirculation")
    report = compare(options.reactors)
    if options.json:
        print(json.dumps(report, indent=2))
    else:
        for name, value in report.items():
            print(f"{name:32} {value:.4g}")
    return 0


if __name__ == "__main__":
    sys.exit(main())
