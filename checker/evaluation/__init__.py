"""Inputs to hydraulics to the fields that rules ask for, each computed once."""

from __future__ import annotations

from checker.evaluation.values import Values, known_fields

__all__ = ["Values", "known_fields"]
