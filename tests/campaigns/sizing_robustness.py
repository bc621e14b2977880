"""Size many random combustors and say how it went: `python tests/campaigns/sizing_robustness.py`.

Prints shares by outcome and the median time; `--json FILE` keeps every outcome.
"""

import argparse
import json
import math
import statistics
import time
from collections import Counter
from pathlib import Path

import numpy as np

from combustor.base.errors import CombustorError, InfeasibleError, InputError
from combustor.sizing import size

try:
    from tests.campaigns.sizing_cases import case_of, fuel_and_gas, overall_of, points
except ImportError:
    from sizing_cases import case_of, fuel_and_gas, overall_of, points


def outcome_of(one):
    """Return what became of one machine."""
    fuel, gas = fuel_and_gas(one["fuel"])
    found = {**one, "overall": None, "outcome": "refused", "said": "", "seconds": 0.0}
    try:
        found["overall"] = overall_of(one)
    except InfeasibleError as error:
        return {**found, "outcome": "no such flame", "said": str(error)}
    try:
        case = case_of(one, found["overall"])
    except InputError as error:
        return {**found, "outcome": "not a case", "said": str(error)}
    start = time.perf_counter()
    try:
        design = size(case, fuel, gas)
    except CombustorError as error:
        return {**found, "said": str(error), "seconds": time.perf_counter() - start}
    found["seconds"] = time.perf_counter() - start
    strange = not_finite(design)
    if strange:
        return {**found, "outcome": "not finite", "said": strange}
    found["act"] = sum(finding.level == "act" for finding in design.findings)
    found["outcome"] = "converged" if design.converged else "not converged"
    found["said"] = design.convergence.message
    return found


def not_finite(design):
    """Return what is not a finite number in a design; empty when nothing."""
    numbers = {d.name: d.value for d in design.dimensions}
    numbers |= {f"limit of {f.what}": f.limit for f in design.findings if f.limit is not None}
    numbers |= {f.what: f.value for f in design.findings if f.value is not None}
    for flow in design.split.openings:
        numbers[f"flow of {flow.name}"] = flow.mass_flow
    for side in design.split.annuli:
        numbers[f"pressure in {side.side}"] = float(np.sum(side.static_pressure))
    return ", ".join(name for name, value in numbers.items() if not math.isfinite(value))


def main(arguments=None):
    """Run the campaign."""
    parser = argparse.ArgumentParser(description=__doc__)
    parser.add_argument("--count", type=int, default=500)
    parser.add_argument("--json", type=Path)
    options = parser.parse_args(arguments)
    outcomes = [outcome_of(one) for one in points(options.count)]
    if options.json:
        options.json.write_text(json.dumps(outcomes, indent=1))
    report(outcomes)


def report(outcomes):
    """Print the shares."""
    lean = [one for one in outcomes if one["overall"] is not None and one["overall"] < 0.5]
    for title, group in (("all", outcomes), ("exit equivalence ratio below 0.5", lean)):
        shares = Counter(one["outcome"] for one in group)
        print(f"{title}: {len(group)}")
        for outcome, count in shares.most_common():
            print(f"  {outcome:16} {count:4}  {100.0 * count / len(group):5.1f} %")
    timed = [one["seconds"] for one in outcomes if one["seconds"] > 0.0]
    print(f"median time {statistics.median(timed):.2f} s, longest {max(timed):.2f} s")
    made = [one for one in outcomes if one["outcome"] == "converged"]
    if made:
        broken = sum(one["act"] > 0 for one in made)
        print(f"converged with a broken limit (act): {broken}")
    for key in ("layout", "front_end", "fuel"):
        for value in sorted({one[key] for one in lean}):
            own = [one for one in lean if one[key] == value]
            good = sum(one["outcome"] == "converged" for one in own)
            print(f"  {key} {value}: {good} of {len(own)}")


if __name__ == "__main__":
    main()
