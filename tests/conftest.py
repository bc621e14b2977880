"""Tables are tested at one width, whatever terminal the tests run in."""

import os

os.environ["COLUMNS"] = "100"
