"""Writing several files whole or not at all."""

from __future__ import annotations

import os
import secrets
import shutil
from collections.abc import Iterable, Mapping
from contextlib import suppress
from pathlib import Path

from lineproof.errors import UserError


def write_all(files: Mapping[Path, bytes], superseded: Iterable[Path] = ()) -> None:
    """Write all files or none, and remove those that they supersede under another name.

    Every file is first written beside its place, then all are renamed into place; when one
    fails, the earlier files and folders stand again as they were. Raises :class:`UserError`.
    """
    work = _Writing()
    try:
        for path, content in files.items():
            work.prepare(path, content)
        work.rename()
        work.set_aside(superseded)
    except OSError as error:
        work.undo()
        place = error.filename2 or error.filename or next(iter(files))
        reason = error.strerror or type(error).__name__
        raise UserError(
            f"{place}: cannot be written ({reason}), nothing has been changed; choose another "
            "folder with --into, or close the program that holds the file"
        ) from None
    except BaseException:
        work.undo()
        raise
    work.finish()


class _Writing:
    def __init__(self) -> None:
        self._mark = f".{secrets.token_hex(4)}.part"
        self._folders: list[Path] = []
        self._new: dict[Path, Path] = {}
        self._old: dict[Path, Path | None] = {}

    def prepare(self, path: Path, content: bytes) -> None:
        """Write a file's content beside its place."""
        self._make_folder(path.parent)
        if path.is_dir():
            raise IsADirectoryError(21, "a folder stands in its place", str(path))
        beside = path.with_name(f".{path.name}{self._mark}")
        self._new[path] = beside
        with beside.open("xb") as stream:
            stream.write(content)
            stream.flush()
            os.fsync(stream.fileno())
        if path.exists():
            shutil.copymode(path, beside)

    def rename(self) -> None:
        """Put the new files in place, keeping the old ones beside them."""
        for path, beside in self._new.items():
            self._old[path] = self._kept(path) if path.exists() else None
            beside.replace(path)

    def set_aside(self, paths: Iterable[Path]) -> None:
        """Take files away, keeping them under another name until all is done."""
        for path in paths:
            self._old[path] = self._kept(path)

    def _kept(self, path: Path) -> Path:
        old = path.with_name(f".{path.name}{self._mark}.old")
        path.replace(old)
        return old

    def undo(self) -> None:
        """Put everything back as it was."""
        for path, old in self._old.items():
            if old is not None:
                old.replace(path)
            elif path.exists() and not self._new[path].exists():
                path.unlink()
        for beside in self._new.values():
            beside.unlink(missing_ok=True)
        for folder in reversed(self._folders):
            with suppress(OSError):  # another issue has meanwhile put its files there
                folder.rmdir()

    def finish(self) -> None:
        """Remove what was kept for undoing."""
        for old in self._old.values():
            if old is not None:
                old.unlink(missing_ok=True)

    def _make_folder(self, folder: Path) -> None:
        if folder.is_dir():
            return
        if folder.parent != folder:
            self._make_folder(folder.parent)
        try:
            folder.mkdir()
        except FileExistsError:
            if not folder.is_dir():  # else another issue has made it in this moment
                what = "a file stands in the place of the folder"
                raise FileExistsError(17, what, str(folder)) from None
        else:
            self._folders.append(folder)
