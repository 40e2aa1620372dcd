"""Why each thing was read as it was, and what became of every entity."""
