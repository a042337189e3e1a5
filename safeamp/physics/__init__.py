"""Pure formulas: keyword-only, numbers or broadcasting arrays in, numbers or arrays out."""
