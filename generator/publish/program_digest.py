"""Which program it was, to the letter: a digest over its source files."""

from __future__ import annotations

import hashlib
from functools import cache
from pathlib import Path

__all__ = ["program_digest"]


@cache
def program_digest() -> str:
    """Digest over the Python files of the program, by path; line ends do not count.

    Returns
    -------
    str
        SHA-256: two programs that could compute differently differ here, whatever version
        they bear.
    """
    folder = Path(__file__).parents[1]
    paths = {path.relative_to(folder).as_posix(): path for path in folder.rglob("*.py")}
    digest = hashlib.sha256()
    for name, path in sorted(paths.items()):
        content = path.read_bytes().replace(b"\r\n", b"\n")
        digest.update(f"{name}\0{len(content)}\0".encode() + content)
    return digest.hexdigest()
