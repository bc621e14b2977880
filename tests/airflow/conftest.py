import sys
from pathlib import Path

# The sample machines live beside these tests; importlib mode does not put folders on the path.
sys.path.insert(0, str(Path(__file__).parent))
