"""Closed shapes: rectangles, outlines with holes, bars, slots; and the record of a joint they make (contact)."""
