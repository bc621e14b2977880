"""Floor 3: drops of liquid fuel, their size and how fast they evaporate."""
