"""Floor 6: many ratings."""
