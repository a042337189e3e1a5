"""Words in, words out, exit status; the only room that knows all others."""

import gc
import os
import sys

#: What a start makes stays: looking through it for garbage again and again is lost time.
_OBJECTS_BETWEEN_LOOKS = 500_000


def main() -> None:
    """Run the command line program; ends the process with its exit status."""
    # Set before anything imports numpy: threads of a matrix library cost more than they bring here.
    os.environ.setdefault("OPENBLAS_NUM_THREADS", "1")
    gc.set_threshold(_OBJECTS_BETWEEN_LOOKS)
    from safeamp.cli.app import program
    from safeamp.cli.output import prepare_streams

    prepare_streams()
    try:
        program(*sys.argv[1:2])(prog_name="safeamp")
    finally:
        gc.disable()  # the end of the process would look through all once more
