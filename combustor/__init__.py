"""Size and rate gas-turbine combustors."""

__version__ = "0.1.0"
