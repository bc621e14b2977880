"""Floor 3: will it light, stay lit, and keep out of the premixer."""
