"""Files written whole or not at all: beside their place first, then renamed into it."""

from __future__ import annotations

import os
from collections.abc import Mapping
from contextlib import ExitStack
from pathlib import Path

from checker.errors import InputError, Problem

__all__ = ["remove_file", "write_files", "write_text"]


def write_text(path: Path, text: str) -> None:
    """Write one text file as UTF-8, whole or not at all."""
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
