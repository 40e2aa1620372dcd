"""What a mechanism is held against, and whether it keeps it: limits and expectations of notes, settings and options."""
