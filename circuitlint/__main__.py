"""`python -m circuitlint` is the command line."""

import sys

from circuitlint.cli import main

if __name__ == "__main__":
    sys.exit(main())
