"""Input motions as stated in options and notes, or assumed."""
