"""Drives applied to the free motions, and the speeds that follow."""
