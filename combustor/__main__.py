"""``python -m combustor``: the same as the command ``combustor``."""

import sys

from combustor.cli import main

if __name__ == "__main__":
    sys.exit(main())
