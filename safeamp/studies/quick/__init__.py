"""Quick answers without a sheet: one file a command, each (options, limits) -> answer."""
