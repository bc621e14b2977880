"""Floor 0: errors, published-method records, findings, convergence."""
