"""``python -m crossbank``: the command line."""

import sys

from crossbank.cli import main

sys.exit(main())
