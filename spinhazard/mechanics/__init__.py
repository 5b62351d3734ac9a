"""Formulas of rotating bodies: pure functions on SI arrays. They know numpy and nothing of files, users or rules."""
