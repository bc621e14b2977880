"""Floor 3: the liner wall and the film beside it."""
