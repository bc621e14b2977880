"""Where a stream of the primary zone may burn or be out, no neighbour decides which."""

import pytest

from combustor.case import loads_case
from combustor.case.starter import starter_text
from combustor.fuel.gas import Gas
from combustor.fuel.of_case import fuel_of
from combustor.rating.rate import rate_near
from combustor.rating.settings import settings_of
from combustor.sizing.size import size


def test_rating_does_not_depend_on_the_neighbour_it_started_from():
    case = loads_case(starter_text(fuel="methane"), "methane.toml")
    fuel = fuel_of(case)
    gas = Gas.load(fuel.mechanism)
    metal = size(case, fuel, gas).hardware

    def at(fuel_flow, near=None):
        update = {"exit_temperature": None, "fuel_flow": fuel_flow}
        point = case.point("idle").model_copy(update=update)
        return rate_near(case, point, fuel, gas, metal, settings_of(case.model), near)

    (_, leaner), (_, richer) = at(0.0278), at(0.0295)
    burning = [near.fire.chain.stations[0].burning.sum() for near in (leaner, richer)]
    assert burning[0] < burning[1]
    alone, _ = at(0.0284)
    for near in (leaner, richer):
        rating, _ = at(0.0284, near)
        assert rating.exit.temperature == pytest.approx(alone.exit.temperature, abs=0.1)
        assert rating.emissions.ei_co == pytest.approx(alone.emissions.ei_co, rel=0.01)
