"""Whether a user's mechanism can serve at all, said before anything is computed."""

from __future__ import annotations

from combustor.base.errors import InputError, Problem
from combustor.fuel.gas import Gas

NEEDED_ELEMENTS = ("O", "H", "N")
NEEDED_SPECIES = ("O2", "N2", "H2O", "H2", "H", "O", "OH", "HO2")
NEEDED_WITH_CARBON = ("CO", "CO2")

NO_NITROGEN = (
    "this mechanism holds no nitrogen chemistry (no NO): it cannot give NOx, and NOx values are "
    "left out"
)


def check_suitable(gas: Gas) -> None:
    """Make sure a mechanism holds what every flame here needs.

    Raises
    ------
    InputError
        Names every element and species that is missing.
    """
    have = {element.upper() for element in gas.element_names}
    elements = [element for element in NEEDED_ELEMENTS if element not in have]
    wanted = NEEDED_SPECIES + (NEEDED_WITH_CARBON if "C" in have else ())
    species = [name for name in wanted if not gas.has(name)]
    problems = []
    if elements:
        problems.append(
            Problem(
                f"this mechanism lacks the elements {', '.join(elements)}",
                key="mechanism",
                value=gas.mechanism,
                allowed="a flame in air needs O, H and N (N2 at least as an inert)",
            )
        )
    if species:
        problems.append(
            Problem(
                f"this mechanism lacks the species {', '.join(species)}",
                key="mechanism",
                value=gas.mechanism,
                allowed="air, products and the radicals of every flame must be there, under "
                "these names in any letter case",
            )
        )
    if problems:
        raise InputError(problems)
