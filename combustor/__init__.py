"""Size and rate gas-turbine combustors."""
