"""Run the command line program as ``python -m safeamp``."""

from safeamp.cli import main

if __name__ == "__main__":
    main()
