"""Velocity constraints of all links, their rank and what they leave free."""
