"""Floor 5: what the metal does at one operating point, split, fire and wall agreed."""
