"""Run the command line: `python -m spanwright` or the installed `spanwright`."""

from __future__ import annotations

import sys

INTERRUPTED = 130
"""Exit status of a run that was interrupted before it had begun."""

try:
    from spanwright.io.command_line import main
except KeyboardInterrupt:
    sys.exit(INTERRUPTED)

if __name__ == "__main__":
    sys.exit(main())
