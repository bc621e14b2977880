"""Floor 1: case files, their schema, units at the border."""

from combustor.case.load import load_case, loads_case, override
from combustor.case.schema import Case

__all__ = ["Case", "load_case", "loads_case", "override"]
