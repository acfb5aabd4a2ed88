"""Words around counts, and fields called by what they mean."""

from __future__ import annotations

import re
from functools import cache

from checker.fields import all_fields
from checker.report.numbers import count
from checker.report.review_contract import ReviewLike
from checker.shown import meaning_of

__all__ = ["beyond", "fields_in_words", "goes_by_case", "listed_meaning", "no_exceptions", "plural"]

_CHECKED = ("meets", "does not meet", "approved deviation")
# Quoted texts are the list's own and stay as they are.
_QUOTED_OR_NAME = re.compile(r"'[^']*'|\b[a-z]+(?:_[a-z]+)+\b")


def plural(number: int, noun: str) -> str:
    """Return a count with its noun, in the plural where it is not one."""
    return f"{count(number)} {noun}" if number == 1 else f"{count(number)} {noun}s"


def no_exceptions(review: ReviewLike) -> str:
    """Return the sentence for a review without exceptions: it never says more than was checked."""
    checked = sum(review.tally.get(word, 0) for word in _CHECKED)
    unchecked = review.tally.get("not checked", 0)
    if not checked + unchecked:
        return "No exceptions, but no rule applied to any line case: nothing was checked."
    if not unchecked:
        return "No exceptions: every applicable outcome was checked."
    if not checked:
        return "No exceptions: none among the 0.0 % that could be checked. Nothing was checked."
    share = min(max(round(100.0 * checked / (checked + unchecked), 1), 0.1), 99.9)
    return f"No exceptions: none among the {share:.1f} % that could be checked."


def beyond(example: str, reason: str) -> str:
    """Return what an example says beyond the reason of its group: the cell, and what stands in it."""
    return example.removeprefix(reason).strip()


def fields_in_words(text: str) -> str:
    """Return a sentence with each field called by its meaning; its name follows where the meaning differs."""

    def named(match: re.Match[str]) -> str:
        name = match[0]
        if name.startswith("'"):
            return name
        plain, meaning = name.replace("_", " "), listed_meaning(name)
        if meaning != plain:
            return f"{meaning} ({name})"
        return plain if name in _listed() else name

    return _QUOTED_OR_NAME.sub(named, text)


def listed_meaning(name: str) -> str:
    """Return what a field of the list means; of a computed one, what that means."""
    return _listed().get(name) or meaning_of(name)


@cache
def goes_by_case(name: str) -> bool:
    """Return whether a field of the list belongs to a case of its line."""
    return any(field.name == name and field.per_case for field in all_fields())


@cache
def _listed() -> dict[str, str]:
    return {field.name: field.meaning for field in all_fields()}
