"""The reports: what was found, for a person at a terminal and for other programs; only this room and cli write."""
