"""Questions asked of the checks."""
