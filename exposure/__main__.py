"""``python -m exposure``."""

import sys

from exposure.command_line import main

sys.exit(main())
