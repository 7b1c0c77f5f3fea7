"""Decide whether two closed braids are the same link, with evidence that anyone can check."""
