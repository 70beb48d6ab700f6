"""``python -m lineproof``: the same as the command ``lineproof``."""

from __future__ import annotations

import sys

from lineproof.cli import main

if __name__ == "__main__":
    sys.exit(main())
