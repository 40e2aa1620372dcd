"""From bodies and joints to named, driven linkages."""
