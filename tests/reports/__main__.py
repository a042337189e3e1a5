"""Write the recorded reports anew: `python -m tests.reports`. Read the difference before you commit it."""

import sys

from tests.report import record
from tests.reports.recorded import SHEETS, printed, recording

for name in sys.argv[1:] or SHEETS:
    path, text = recording(name), printed(name)
    same = path.exists() and path.read_text(encoding="utf-8") == text
    path.write_text(text, encoding="utf-8")
    sys.stdout.write(f"{path.name}: {'as before' if same else 'written'}\n")
if not sys.argv[1:]:
    record.main()
