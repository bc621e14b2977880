"""Floor 4: from targets to metal."""
