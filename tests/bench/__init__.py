"""How long the commands take, as ratios to importing numpy: a number to read, never a test that fails."""
