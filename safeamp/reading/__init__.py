"""Files to nouns: sheets, limits, devices; every complaint at once."""

from safeamp.reading.sheets import Source, load_sheet, open_mapping, open_sheet, sheet_from

__all__ = ["Source", "load_sheet", "open_mapping", "open_sheet", "sheet_from"]
