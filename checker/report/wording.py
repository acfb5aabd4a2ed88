"""Words around counts, and fields called by what they mean."""

from __future__ import annotations

import re

from checker.fields import all_fields
from checker.report.numbers import count
from checker.report.review_contract import ReviewLike
from checker.shown import meaning_of

__all__ = ["fields_in_words", "no_exceptions", "plural"]

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


def fields_in_words(text: str) -> str:
    """Return a sentence with each field called by its meaning; its name follows where the meaning differs."""
    known = {field.name for field in all_fields()}

    def named(match: re.Match[str]) -> str:
        name = match[0]
        meaning = name if name.startswith("'") else meaning_of(name)
        if meaning == name or (name not in known and meaning == name.replace("_", " ")):
            return name
        return meaning if meaning == name.replace("_", " ") else f"{meaning} ({name})"

    return _QUOTED_OR_NAME.sub(named, text)
