"""Rings and linework laid out side by side: what lies near what, and where ends land."""
