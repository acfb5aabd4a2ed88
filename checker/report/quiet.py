"""Libraries kept quiet while they load and draw: what a reader must know, the report says itself."""

from __future__ import annotations

import logging
import os
import tempfile
from collections.abc import Iterator
from contextlib import contextmanager, redirect_stderr, redirect_stdout
from functools import cache
from io import StringIO
from pathlib import Path

__all__ = ["quiet_drawing", "quiet_printing"]


@contextmanager
def quiet_printing() -> Iterator[None]:
    """Let a library print nothing while it loads and sets pages; its caches get a place where home has none."""
    with _places_for_caches(("XDG_CACHE_HOME",)), redirect_stdout(StringIO()), redirect_stderr(StringIO()):
        yield


@contextmanager
def quiet_drawing() -> Iterator[None]:
    """Let matplotlib say nothing of its folders and caches, and give them a place where the home folder has none."""
    logger = logging.getLogger("matplotlib")
    level = logger.level
    logger.setLevel(logging.ERROR)
    try:
        with _places_for_caches(("MPLCONFIGDIR",)):
            yield
    finally:
        logger.setLevel(level)


@contextmanager
def _places_for_caches(names: tuple[str, ...]) -> Iterator[None]:
    """Set environment variables to a temporary folder for as long as it takes, where the usual places are shut."""
    replaced = {name: os.environ.get(name) for name in names if not all(map(_is_open, _usual_places(name)))}
    if replaced:
        os.environ.update(dict.fromkeys(replaced, _temporary_folder().name))
    try:
        yield
    finally:
        for name, value in replaced.items():
            if value is None:
                os.environ.pop(name, None)
            else:
                os.environ[name] = value


def _usual_places(name: str) -> tuple[Path, ...]:
    home = Path(os.path.expanduser("~"))
    own = os.environ.get(name)
    if own:
        return (Path(own),)
    caches = Path(os.environ.get("XDG_CACHE_HOME") or home / ".cache")
    if name == "XDG_CACHE_HOME":
        return (caches,)
    return (Path(os.environ.get("XDG_CONFIG_HOME") or home / ".config") / "matplotlib", caches / "matplotlib")


def _is_open(place: Path) -> bool:
    """Return whether a folder can be written, or made: then its nearest parent that is there can."""
    nearest = place
    while not nearest.exists() and nearest != nearest.parent:
        nearest = nearest.parent
    return nearest.is_dir() and os.access(nearest, os.W_OK | os.X_OK) and _takes_a_file(nearest)


def _takes_a_file(folder: Path) -> bool:
    try:
        with tempfile.TemporaryFile(dir=folder):
            return True
    except OSError:
        return False


@cache
def _temporary_folder() -> tempfile.TemporaryDirectory[str]:
    """Return one folder for the whole run: the libraries remember where it is. It goes with the program."""
    return tempfile.TemporaryDirectory(prefix="linelist-")
