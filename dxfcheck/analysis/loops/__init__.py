"""Independent loops, and the second solution of the speeds by their equations."""
