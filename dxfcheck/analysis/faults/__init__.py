"""Who is locked, free, idle or redundant, and what would mend it."""
