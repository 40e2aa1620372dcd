"""Frame symbols and marks: what is drawn beside a linkage to explain it."""
