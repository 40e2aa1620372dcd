"""The solution in the order and form of a hand check."""
