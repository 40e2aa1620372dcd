"""Lengths and units that the sheet states in words, against those that are drawn."""
