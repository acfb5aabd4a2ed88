"""Design-rule checker for piping line lists."""

from __future__ import annotations

__version__ = "0.1.0"
