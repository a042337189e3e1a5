"""How long the work takes, as ratios; threads of the matrix library would count twice, so they are off."""

import os

os.environ.setdefault("OPENBLAS_NUM_THREADS", "1")
