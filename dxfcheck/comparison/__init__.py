"""What changed between two drawings as a mechanism; see ``compare.compare_reports``."""
