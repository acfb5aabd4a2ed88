"""What a workbook may hold: limits that are checked before anything of it is parsed."""

from __future__ import annotations

__all__ = [
    "DEEPEST",
    "LARGEST_ROW",
    "MOST_BYTES",
    "MOST_DIRECTORY",
    "MOST_INFLATED",
    "MOST_MERGED",
    "MOST_OTHER_TAGS",
    "MOST_PARTS",
    "MOST_PART_INFLATED",
    "MOST_RATIO",
    "MOST_SHARED_TAGS",
    "MOST_TAGS",
    "RATIO_FROM",
]

MOST_BYTES = 100_000_000
"""Bytes of the file."""

MOST_DIRECTORY = 4_000_000
"""Bytes of the directory of the container."""

MOST_PARTS = 5_000
"""Members of the container."""

MOST_INFLATED = 600_000_000
"""Declared bytes of all members unpacked."""

MOST_PART_INFLATED = 300_000_000
"""Declared bytes of one member unpacked."""

MOST_RATIO = 200
"""Unpacked bytes for each packed one; a sheet of real cells stays under 100."""

RATIO_FROM = 2_000_000
"""Unpacked bytes of a member from which on its ratio counts."""

MOST_TAGS = 30_000_000
"""Tags of a sheet, about seven million cells."""

MOST_SHARED_TAGS = 4_000_000
"""Tags of the shared texts, about one million of them; openpyxl takes some microseconds for each."""

MOST_OTHER_TAGS = 500_000
"""Tags of any other part that is read: styles, relations, properties."""

DEEPEST = 200
"""Depth of nesting of an XML part; a sheet needs less than ten."""

LARGEST_ROW = 8_000_000
"""Bytes of XML within which one row must end."""

MOST_MERGED = 100_000
"""Merged ranges of a sheet."""
