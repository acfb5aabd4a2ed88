"""Files written whole or not at all: beside their place first, then renamed into it."""

from __future__ import annotations

import errno
import os
from collections.abc import Iterable, Mapping
from contextlib import ExitStack
from pathlib import Path

from checker.errors import InputError, Problem

__all__ = ["check_places", "remove_file", "write_files", "write_text"]


def check_places(folder: Path, names: Iterable[str]) -> None:
    """Refuse a folder that cannot take these files, before any work is done for them.

    Raises
    ------
    InputError
        The folder is none, cannot be written, or a folder stands where a file is to be.
    """
    nearest = folder
    while not nearest.exists() and nearest != nearest.parent:
        nearest = nearest.parent
    remedy = "Name another place to write to."
    if not nearest.is_dir():
        raise InputError(Problem("is no folder.", str(nearest), remedy))
    if not os.access(nearest, os.W_OK | os.X_OK):
        raise InputError(Problem("cannot be written.", str(nearest), remedy))
    for name in names:
        place = folder / name
        if place.is_dir():
            raise InputError(Problem("is a folder, where a file is to be written.", str(place), remedy))
        if place.exists() and not place.is_file():
            raise InputError(Problem("is no ordinary file, and would be replaced by one.", str(place), remedy))


def write_text(path: Path, text: str) -> None:
    """Write one text file as UTF-8, whole or not at all; a link is followed to the file it names."""
    path = path.resolve()
    write_files(path.parent, {path.name: text.encode("utf-8", errors="backslashreplace")})


def write_files(folder: Path, contents: Mapping[str, bytes]) -> tuple[Path, ...]:
    """Write several files into a folder, none of them before all stand complete beside their places.

    Parameters
    ----------
    folder : Path
        Folder for the files; made where it is not there.
    contents : mapping of str to bytes
        Content by file name.

    Returns
    -------
    tuple of Path
        The files, in the order given.

    Raises
    ------
    InputError
        The folder or a file in it cannot be written.
    """
    try:
        folder.mkdir(parents=True, exist_ok=True)
        return _place_all(folder, contents)
    except OSError as error:
        raise InputError(_cannot_write(folder, error)) from error


def remove_file(path: Path) -> bool:
    """Remove a file that would mislead beside newer ones; return whether there was one."""
    if not path.is_file():
        return False
    try:
        path.unlink()
    except OSError as error:
        raise InputError(_cannot_write(path, error)) from error
    return True


def _place_all(folder: Path, contents: Mapping[str, bytes]) -> tuple[Path, ...]:
    with ExitStack() as clean_up:
        waiting = []
        for name, content in contents.items():
            beside = folder / f".{name}.{os.getpid()}.part"
            clean_up.callback(beside.unlink, missing_ok=True)
            _write_beside(beside, content)
            waiting.append((beside, folder / name))
        for _, place in waiting:
            if place.is_dir():
                raise IsADirectoryError(errno.EISDIR, os.strerror(errno.EISDIR), str(place))
        for beside, place in waiting:
            os.replace(beside, place)
        return tuple(place for _, place in waiting)


def _write_beside(beside: Path, content: bytes) -> None:
    with beside.open("wb") as stream:
        stream.write(content)
        stream.flush()
        os.fsync(stream.fileno())


def _cannot_write(place: Path, error: OSError) -> Problem:
    return Problem(
        what=f"the output cannot be written here ({error.strerror or type(error).__name__}).",
        where=str(place),
        remedy="Close the file if another program holds it, or name another place to write to.",
    )
