"""Everything a review writes or prints: one module an output."""

from __future__ import annotations
