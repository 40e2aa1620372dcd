"""Settings files: where they lie, what they may say, what is wrong in them, and what holds for one drawing.

Nothing here loads ezdxf, networkx or numpy.
"""
