"""Jet A, lumped, against the published 201-species model over 96 stirred reactors.

    python tests/campaigns/jet_a.py MODEL.yaml [COUNT]

MODEL.yaml is the model's own file; without it the campaign skips and says so. The model is solved
anew at each point and compared with the lumped fuel and with the stored reference table.
"""

from __future__ import annotations

import csv
import sys
import warnings
from dataclasses import dataclass
from pathlib import Path
from statistics import median

from combustor.fuel import catalogue
from combustor.fuel.gas import Gas
from combustor.kinetics.extinction import blowout_residence_time
from combustor.kinetics.stirred import stirred

REFERENCE = Path(__file__).parents[1] / "reference" / "jet_a_stirred.csv"
DRY_AIR_MASS = 28.9647e-3  # kg/mol
MODEL_FUEL = "POSF10325"
EXEMPT = 2.0  # within this factor of either blow-out time temperature, CO and NOx are left out


@dataclass(frozen=True)
class Reactor:
    """One point: inputs in SI, what a model makes of it (None where it does not burn)."""

    equivalence_ratio: float
    pressure: float
    temperature: float
    residence_time: float
    status: str
    blowout_time: float | None
    stirred_temperature: float | None
    x_co: float | None
    x_nox: float | None


def reference() -> list[Reactor]:
    """Return the stored results of the detailed model."""
    lines = [line for line in REFERENCE.read_text(encoding="utf-8").splitlines() if line[0] != "#"]
    found = []
    for row in csv.DictReader(lines):
        inputs = [float(row[k]) for k in list(row)[:4]]
        values = [float(row[k]) if row[k] else None for k in list(row)[5:]]
        found.append(Reactor(*inputs, row["status"], *values))
    return found


def lumped() -> tuple[Gas, str]:
    """Return the package's own Jet A."""
    fuel = catalogue.find("jet-a")
    return Gas.load(fuel.mechanism), next(iter(fuel.composition))


def solved(gas: Gas, species: str, point: Reactor) -> Reactor:
    """Return what a mechanism makes of a point."""
    place = gas.index(species)
    oxygen = float(gas.oxygen_demands[place])
    stoichiometric = gas.molar_masses[place] / (oxygen / 0.2095 * DRY_AIR_MASS)
    share = point.equivalence_ratio * stoichiometric
    share /= 1.0 + share
    mixture = share * gas.from_mole_fractions({species: 1.0}) + (1.0 - share) * gas.air(0.0)
    heat = gas.enthalpy(point.temperature, point.pressure, mixture)
    out = blowout_residence_time(gas, point.pressure, heat, mixture)
    found = stirred(gas, point.pressure, heat, mixture, residence_time=point.residence_time)
    burning = found.status == "burning"
    moles = gas.mole_fractions(found.state.mass_fractions)
    nox = float(moles[gas.index("NO")] + moles[gas.index("NO2")])
    return Reactor(
        point.equivalence_ratio,
        point.pressure,
        point.temperature,
        point.residence_time,
        found.status,
        None if out is None else out.residence_time,
        found.state.temperature if burning else None,
        float(moles[gas.index("CO")]) if burning else None,
        nox if burning else None,
    )


@dataclass(frozen=True)
class Comparison:
    """One point of ours against the reference: differences and ratios, None where exempt."""

    equivalence_ratio: float
    same_verdict: bool | None
    blowout: float | None
    temperature: float | None
    co: float | None
    nox: float | None


def compare(mine: Reactor, theirs: Reactor) -> Comparison:
    """Return how a lumped point stands to the detailed model's."""
    times = [t for t in (mine.blowout_time, theirs.blowout_time) if t is not None]
    near = any(t / EXEMPT < mine.residence_time < t * EXEMPT for t in times)
    blowout = mine.blowout_time / theirs.blowout_time if len(times) == 2 else None
    same = None if near else mine.status == theirs.status
    if near or mine.x_co is None or theirs.x_co is None:
        return Comparison(mine.equivalence_ratio, same, blowout, None, None, None)
    return Comparison(
        mine.equivalence_ratio,
        same,
        blowout,
        mine.stirred_temperature - theirs.stirred_temperature,
        mine.x_co / theirs.x_co,
        mine.x_nox / theirs.x_nox,
    )


def summary(rows: list[Comparison]) -> str:
    """Return the comparison in lines."""
    lean = [r for r in rows if r.equivalence_ratio <= 1.0]
    rich = [r for r in rows if r.equivalence_ratio > 1.0]
    judged = [r.same_verdict for r in rows if r.same_verdict is not None]
    groups = {
        "temperature, K off": [r.temperature for r in rows],
        "CO, ratio": [r.co for r in rows],
        "NOx up to 1.0, ratio": [r.nox for r in lean],
        "NOx 1.0 to 1.3, ratio": [r.nox for r in rich if r.equivalence_ratio <= 1.3],
        "NOx beyond 1.3, ratio": [r.nox for r in rich if r.equivalence_ratio > 1.3],
        "blow-out time up to 1.0, ratio": [r.blowout for r in lean],
        "blow-out time beyond 1.0, ratio": [r.blowout for r in rich],
    }
    lines = [f"{'verdict agrees':32}{sum(judged)} of {len(judged)}"]
    for name, values in groups.items():
        there = [v for v in values if v is not None]
        span = f"{min(there):8.3f} to {max(there):8.3f}, median {median(there):8.3f}"
        lines.append(f"{name:32}{span} ({len(there)} points)")
    return "\n".join(lines)


def main(arguments: list[str]) -> int:
    """Run the campaign."""
    if not arguments or not Path(arguments[0]).is_file():
        print("skipped: give the path of the published 201-species model (it is not shipped here)")
        return 0
    count = int(arguments[1]) if len(arguments) > 1 else None
    with warnings.catch_warnings():
        warnings.simplefilter("ignore")  # the model's polynomials do not meet exactly
        detailed = Gas.load(arguments[0])
    points = reference()[:count]
    theirs = [solved(detailed, MODEL_FUEL, point) for point in points]
    worst = max(
        abs(new.stirred_temperature - old.stirred_temperature)
        for new, old in zip(theirs, points, strict=True)
        if new.stirred_temperature is not None and old.stirred_temperature is not None
    )
    print(f"stored table against the model solved anew: {worst:.2g} K at most")
    gas, species = lumped()
    mine = [solved(gas, species, point) for point in points]
    rows = [compare(a, b) for a, b in zip(mine, theirs, strict=True)]
    for name, half in (("tuned on", rows[::2]), ("not tuned on", rows[1::2])):
        print(f"\npoints {name}:\n{summary(half)}")
    return 0


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))
