"""Limits and expectations as stated in settings and in notes on the sheet."""
