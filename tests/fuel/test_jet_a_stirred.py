"""Lumped Jet A in stirred reactors against stored results of the published detailed model."""

from __future__ import annotations

import importlib.util
import sys
from pathlib import Path
from statistics import median

import pytest

CAMPAIGN = Path(__file__).parents[1] / "campaigns" / "jet_a.py"


def campaign():
    spec = importlib.util.spec_from_file_location("jet_a_campaign", CAMPAIGN)
    module = importlib.util.module_from_spec(spec)
    sys.modules[spec.name] = module
    spec.loader.exec_module(module)
    return module


@pytest.fixture(scope="module")
def rows():
    jet = campaign()
    points = jet.reference()[1::8]  # of the half that nothing was tuned on
    gas, species = jet.lumped()
    return [jet.compare(jet.solved(gas, species, point), point) for point in points]


def there(values):
    return [value for value in values if value is not None]


def test_temperature_and_carbon_monoxide(rows):
    assert max(abs(t) for t in there(r.temperature for r in rows)) < 30.0
    assert all(0.8 < co < 1.2 for co in there(r.co for r in rows))


def test_nox_up_to_the_equivalence_ratio_it_is_trusted_to(rows):
    lean = there(r.nox for r in rows if r.equivalence_ratio <= 1.0)
    assert all(0.6 < ratio < 1.4 for ratio in lean)
    assert 0.7 < median(lean) < 1.3
    rich = there(r.nox for r in rows if 1.0 < r.equivalence_ratio <= 1.3)
    assert all(0.5 < ratio < 2.0 for ratio in rich)


def test_blow_out(rows):
    verdicts = there(r.same_verdict for r in rows)
    assert sum(verdicts) >= 0.95 * len(verdicts)
    lean = there(r.blowout for r in rows if r.equivalence_ratio <= 1.0)
    assert all(1 / 1.5 < ratio < 1.5 for ratio in lean)
    rich = there(r.blowout for r in rows if r.equivalence_ratio > 1.0)
    assert all(0.5 < ratio < 2.0 for ratio in rich)
