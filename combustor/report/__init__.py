"""Floor 7: text, colour, JSON and CSV live here alone."""
