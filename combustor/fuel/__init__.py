"""Floor 2: fuels, their composition, heating value and mechanism."""
