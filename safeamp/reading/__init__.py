"""Files to nouns: sheets, limits, devices; every complaint at once."""

from safeamp.reading.sheets import load_sheet, sheet_from

__all__ = ["load_sheet", "sheet_from"]
