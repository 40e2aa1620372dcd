"""Blocks, barrels and sleeves, and what each slides along."""
