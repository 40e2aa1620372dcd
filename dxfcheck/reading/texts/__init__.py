"""Which texts stand by which pins and lines, and the names of pins."""
