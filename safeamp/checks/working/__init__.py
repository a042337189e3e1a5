"""How the nominal value of each finding comes about, line by line: written only when somebody asks."""
