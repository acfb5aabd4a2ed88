"""Design-rule checker for piping line lists: hydraulics, criteria, outcomes and an exception report.

>>> import checker
>>> done = checker.review("list.csv", criteria="criteria.toml")  # doctest: +SKIP
>>> done.recommendation  # doctest: +SKIP
'revise and resubmit'
"""

from __future__ import annotations

from checker.review import review

__version__ = "0.1.0"
__all__ = ["__version__", "review"]
