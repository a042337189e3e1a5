"""Files to nouns: sheets, limits, devices; every complaint at once."""
