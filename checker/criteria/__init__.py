"""The project's design criteria and its class file: limits by service, defaults, and what a piping class says."""

from __future__ import annotations
