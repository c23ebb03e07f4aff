"""Building an output folder aside and putting it in place in one step."""

from __future__ import annotations

import os
import shutil
import tempfile
from collections.abc import Iterator
from contextlib import contextmanager
from pathlib import Path

from generator.errors import UseError

__all__ = ["FolderExchange", "PublishError"]

_MARK = "manifest.json"


class PublishError(UseError):
    """The output folder cannot be written; says which and why."""


class FolderExchange:
    """A new folder that takes the place of a former one only when it is complete.

    The new folder is made beside the target, so that the last step is a rename on one file
    system. Where anything fails before that, the former folder is left exactly as it was.

    Parameters
    ----------
    target
        Folder to put in place. It may be absent, empty, or a folder issued before; anything
        else is refused, because it would be replaced whole.
    forbidden
        Folder that must neither be the target nor lie inside it: the campaign itself.

    Raises
    ------
    PublishError
        If the target may not be replaced.
    """

    def __init__(self, target: Path, forbidden: Path) -> None:
        self.target = target.resolve()
        source = forbidden.resolve()
        if source == self.target or source.is_relative_to(self.target):
            raise PublishError(f"{target} holds the campaign itself; name another folder with --to")
        if self.target.is_file():
            raise PublishError(f"{target} is a file; name a folder with --to")
        if self.target.is_dir() and any(self.target.iterdir()) and not self._issued_before():
            raise PublishError(
                f"{target} is not empty and was not issued by lampassay (it has no {_MARK}); "
                "empty it, or name another folder with --to"
            )

    def _issued_before(self) -> bool:
        return (self.target / _MARK).is_file()

    @contextmanager
    def building(self) -> Iterator[Path]:
        """Give an empty folder to build in; put it in place when the block ends well."""
        parent = self.target.parent
        parent.mkdir(parents=True, exist_ok=True)
        scratch = Path(tempfile.mkdtemp(prefix=f".{self.target.name}.", dir=parent))
        try:
            new = scratch / "new"
            new.mkdir()
            yield new
            self._exchange(new, scratch / "former")
        finally:
            shutil.rmtree(scratch, ignore_errors=True)

    def _exchange(self, new: Path, former: Path) -> None:
        new.chmod(0o777 & ~_current_umask())
        if self.target.exists():
            self.target.rename(former)
        try:
            new.rename(self.target)
        except OSError:
            if former.exists():
                former.rename(self.target)
            raise


def _current_umask() -> int:
    """The permission bits this process withholds from new files."""
    mask = os.umask(0)
    os.umask(mask)
    return mask
