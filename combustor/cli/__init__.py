"""Floor 8: arguments in, tables out, exit codes. No engineering."""

from combustor.cli.run import main

__all__ = ["main"]
