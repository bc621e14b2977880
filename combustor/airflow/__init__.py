"""Floor 3: how the air splits through the metal."""
