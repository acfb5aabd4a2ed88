"""Pipe data: dimensions by nominal size and schedule, roughness by material."""
