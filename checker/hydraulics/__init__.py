"""Pipe hydraulics: pure functions on SI arrays, and `compose`, which runs them over all line cases."""
