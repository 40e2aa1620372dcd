"""Strands welded into rigid bodies, with their pins."""
