"""A criteria file as bytes, text and TOML: everything that can go wrong before its keys are looked at."""

from __future__ import annotations

import hashlib
import tomllib
from pathlib import Path
from typing import Any

from checker.errors import InputError, Problem
from checker.model import Source

__all__ = ["read_bytes", "read_text", "read_toml"]

LARGEST_FILE = 2_000_000


def read_bytes(path: Path, *, what: str) -> bytes:
    """Return the bytes of an input file of at most 2 MB.

    Raises
    ------
    InputError
        If there is no such file, it cannot be read, or it is too large; `what` names its purpose in the sentence.
    """
    place = str(path)
    if not path.is_file():
        raise InputError(Problem(f"there is no such file to read as {what}.", place, "Check the path."))
    try:
        with path.open("rb") as handle:
            content = handle.read(LARGEST_FILE + 1)
    except OSError as error:
        reason = error.strerror or "unknown reason"
        raise InputError(Problem(f"the {what} cannot be read: {reason}.", place, "Check its permissions.")) from error
    if len(content) > LARGEST_FILE:
        remedy = f"Check that this is the {what}: it should be a small text file."
        raise InputError(Problem(f"the file is larger than {LARGEST_FILE / 1e6:g} MB.", place, remedy))
    return content


def read_text(path: Path, *, what: str) -> tuple[str, Source]:
    """Return a file's UTF-8 text, and its name with its SHA-256.

    Raises
    ------
    InputError
        As `read_bytes`, and if the file is not UTF-8.
    """
    content = read_bytes(path, what=what)
    try:
        text = content.decode("utf-8-sig")
    except UnicodeDecodeError as error:
        line = content.count(b"\n", 0, error.start) + 1
        raise InputError(
            Problem(f"the file is not UTF-8 text (first at line {line}).", str(path), "Save it as UTF-8.")
        ) from error
    return text, Source(path.name, hashlib.sha256(content).hexdigest())


def read_toml(path: Path) -> tuple[dict[str, Any], Source]:
    """Return the document of a TOML file, and its name with its SHA-256.

    Raises
    ------
    InputError
        As `read_text`, and if the text is no TOML; the sentence names line and column.
    """
    text, source = read_text(path, what="criteria file")
    try:
        return tomllib.loads(text), source
    except RecursionError as error:
        raise InputError(
            Problem("tables or lists are nested too deep to be read.", str(path), "Write plain tables.")
        ) from error
    except ValueError as error:
        raise InputError(
            Problem(f"not TOML: {str(error)[:200]}.", str(path), 'Texts stand in quotes: key = "3.0 m/s".')
        ) from error
