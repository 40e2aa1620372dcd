"""Pitch circles, racks and wheels: what rolls on what."""
