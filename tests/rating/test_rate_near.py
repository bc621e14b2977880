"""A rating that starts from a neighbour's solution gives the answer of one that does not."""

from dataclasses import replace

import pytest

from combustor.rating.rate import rate_near


@pytest.mark.parametrize("point", ["full", "idle"])
def test_a_neighbours_solution_saves_passes_and_changes_nothing(bench, point):
    dilution = next(o for o in bench.design.hardware.openings if o.name == "dilution")
    wider = bench.with_row("dilution", area=1.04 * dilution.area)
    settings = replace(bench.settings, streams=3)

    def rate(hardware, near=None):
        return rate_near(
            bench.case,
            bench.point(point),
            bench.fuel,
            bench.gas,
            hardware,
            settings,
            near,
            operability=True,
        )

    _, neighbour = rate(bench.design.hardware)
    afresh, cold = rate(wider)
    found, warm = rate(wider, neighbour)
    assert warm.convergence.converged
    assert warm.convergence.iterations <= cold.convergence.iterations
    assert found.exit.temperature == pytest.approx(afresh.exit.temperature, abs=0.1)
    assert found.emissions.nox_dry_15 == pytest.approx(afresh.emissions.nox_dry_15, rel=1e-3)
    assert found.pressure_loss == pytest.approx(afresh.pressure_loss, rel=1e-5)
    margin = found.operability["blowout_margin_percent"]
    expected = afresh.operability["blowout_margin_percent"]
    assert 1.0 - margin / 100.0 == pytest.approx(1.0 - expected / 100.0, rel=0.06)
    for key in ("air", "elements", "enthalpy"):
        assert found.balances[key] == pytest.approx(0.0, abs=1e-7)
