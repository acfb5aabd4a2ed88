"""Design-rule checker for piping line lists: hydraulics, criteria, outcomes and an exception report.

>>> import checker
>>> done = checker.review("list.csv", criteria="criteria.toml")  # doctest: +SKIP
>>> done.recommendation  # doctest: +SKIP
'revise and resubmit'
"""

from __future__ import annotations

import sys
from types import ModuleType
from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from checker.review import review

__version__ = "0.1.0"
__all__ = ["__version__", "review"]


class _Package(ModuleType):
    """Loads `review` when it is first asked for: a part of the package used alone does not pay for all the others.

    The function stands under its name for good: the module it comes from, which has the same name, does not replace it
    when it is imported.
    """

    def __getattr__(self, name: str) -> Any:
        if name != "review":
            raise AttributeError(f"module {self.__name__!r} has no attribute {name!r}")
        from checker.review import review as function

        self.__dict__[name] = function
        return function

    def __setattr__(self, name: str, value: object) -> None:
        if name != "review" or not isinstance(value, ModuleType):
            super().__setattr__(name, value)


sys.modules[__name__].__class__ = _Package
