from dataclasses import replace
from pathlib import Path
from typing import Any

import pytest

from combustor.case import Case, load_case
from combustor.case.schema import Point
from combustor.fuel.gas import Gas
from combustor.fuel.of_case import fuel_of
from combustor.hardware.metal import Hardware
from combustor.rating.rate import rate_point
from combustor.rating.record import PointRating
from combustor.rating.settings import Settings, settings_of
from combustor.sizing.record import Design
from combustor.sizing.size import size

DEMO = Path(__file__).parents[2] / "demo" / "industrial_can.toml"


class Bench:
    """The demo machine on the bench: sized once, rated as a test asks."""

    def __init__(self) -> None:
        self.case: Case = load_case(DEMO)
        self.fuel = fuel_of(self.case)
        self.gas = Gas.load(self.fuel.mechanism)
        self.design: Design = size(self.case, self.fuel, self.gas)
        self.settings: Settings = settings_of(self.case.model)
        self._known: dict[str, PointRating] = {}

    def point(self, name: str, **changes: Any) -> Point:
        return self.case.point(name).model_copy(update=changes)

    def rate(
        self,
        name: str = "full",
        hardware: Hardware | None = None,
        settings: dict[str, Any] | None = None,
        **changes: Any,
    ) -> PointRating:
        """Rate one point of the demo, with other metal, settings or inlet where asked."""
        return rate_point(
            self.case,
            self.point(name, **changes),
            self.fuel,
            self.gas,
            self.design.hardware if hardware is None else hardware,
            replace(self.settings, **(settings or {})),
        )

    def rated(self, name: str = "full") -> PointRating:
        """The unchanged point, solved once for all tests."""
        if name not in self._known:
            self._known[name] = self.rate(name)
        return self._known[name]

    def with_row(self, name: str, **changes: Any) -> Hardware:
        """The metal with one row changed."""
        metal = self.design.hardware
        rows = tuple(replace(o, **changes) if o.name == name else o for o in metal.openings)
        return replace(metal, openings=rows)


@pytest.fixture(scope="session")
def bench() -> Bench:
    return Bench()
