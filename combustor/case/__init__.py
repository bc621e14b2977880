"""Floor 1: case files, their schema, units at the border."""
