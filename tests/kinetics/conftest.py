"""One mechanism for the whole room: loading it anew for every test would cost most of the time."""

from __future__ import annotations

import pytest

from combustor.fuel.gas import Gas


@pytest.fixture(scope="session")
def gas() -> Gas:
    return Gas.load("gri30.yaml")


@pytest.fixture(scope="session")
def mixtures(gas: Gas) -> Mixtures:
    return Mixtures(gas)


class Mixtures:
    """Methane in the dry air of the computed reference tables."""

    stoichiometric = 0.05803

    def __init__(self, gas: Gas) -> None:
        self.gas = gas
        self.air = gas.from_mole_fractions({"O2": 0.2095, "N2": 0.7812, "AR": 0.0093})
        self.methane = gas.from_mole_fractions({"CH4": 1.0})

    def of(self, equivalence_ratio, fuel=None, stoichiometric=None):
        """Return mass fractions and the fuel's mass share."""
        fuel = self.methane if fuel is None else self.gas.from_mole_fractions(fuel)
        ratio = equivalence_ratio * (stoichiometric or self.stoichiometric)
        share = ratio / (1.0 + ratio)
        return share * fuel + (1.0 - share) * self.air, share

    def nox(self, fractions):
        """Return NO and NO2 as NO2, by mass of gas."""
        no, no2 = (float(fractions[self.gas.index(name)]) for name in ("NO", "NO2"))
        return no * 46.0055 / 30.0061 + no2

    def co(self, fractions):
        return float(fractions[self.gas.index("CO")])

    def dry_15(self, fractions, species):
        """Return ppm, dry, at 15 % O2 with 20.95 % O2 in air."""
        moles = self.gas.mole_fractions(fractions)
        dry = 1.0 - moles[self.gas.index("H2O")]
        oxygen = moles[self.gas.index("O2")] / dry
        wanted = sum(moles[self.gas.index(name)] for name in species) / dry
        return 1e6 * wanted * (0.2095 - 0.15) / (0.2095 - oxygen)
