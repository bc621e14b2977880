"""Floor 3: emissions on every basis."""
