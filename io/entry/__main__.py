"""Run the command line: `python -m spanwright` or the installed `spanwright`."""

from __future__ import annotations

import sys

from spanwright.io.command_line import main

if __name__ == "__main__":
    sys.exit(main())
