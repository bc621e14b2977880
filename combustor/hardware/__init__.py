"""Floor 2: the metal. No flow, no temperature."""
