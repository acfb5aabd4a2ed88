"""A provider computes derived fields under the same parameter-name contract as a rule."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import Any

from checker.ruling.contract import parameter_names

__all__ = ["Provider", "provider"]


@dataclass(frozen=True, slots=True)
class Provider:
    """A pure function of fields and the names of what it gives.

    A function with one output returns the array; one with several returns a mapping of name to array.
    """

    function: Callable[..., Any]
    outputs: tuple[str, ...]
    needs: tuple[str, ...]

    def results(self, arguments: dict[str, Any]) -> dict[str, Any]:
        """Return every output by name."""
        returned = self.function(**arguments)
        return returned if isinstance(returned, dict) else {self.outputs[0]: returned}


def provider(function: Callable[..., Any], *outputs: str) -> Provider:
    """Wrap a function; without outputs its own name is its one output."""
    return Provider(function, outputs or (function.__name__,), parameter_names(function))
