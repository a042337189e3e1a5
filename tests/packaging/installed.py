"""Ask an installed package for its data; run by the interpreter of its environment, away from the tree."""

import sys
from pathlib import Path

import safeamp
from safeamp.reading.data import device_folder, limits_folder
from safeamp.reading.devices import device_files
from safeamp.reading.limits import load_limits

package = Path(safeamp.__file__).parent
assert limits_folder() == package / "_data" / "limits", limits_folder()
assert (package / "py.typed").is_file()
limits = load_limits()
devices = device_files(device_folder())
assert limits["offset.output"].go == 0.05
assert devices
sys.stdout.write(f"safeamp {safeamp.__version__}: {len(limits.entries)} limits, {len(devices)} devices\n")
