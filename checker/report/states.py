"""The states of an outcome, told by word and shape; colour only supports them."""

from __future__ import annotations

from typing import NamedTuple

__all__ = ["STATES", "TALLY_ORDER", "State", "state_of"]


class State(NamedTuple):
    """One state: its word, its shape, and the name under which the style sheet knows it."""

    word: str
    shape: str
    style: str


STATES = {
    "does not meet": State("does not meet", "■", "fails"),
    "not checked": State("not checked", "◆", "unchecked"),
    "near limit": State("near limit", "▲", "near"),
    "approved deviation": State("approved deviation", "□", "approved"),
    "meets": State("meets", "●", "meets"),
    "not applicable": State("not applicable", "○", "inapplicable"),
}
TALLY_ORDER = ("does not meet", "not checked", "approved deviation", "meets", "not applicable")


def state_of(word: str) -> State:
    """Return the state of a word; a word that is not one of them is shown as it is, with the shape of not checked."""
    return STATES.get(word, State(word, "◆", "unchecked"))
