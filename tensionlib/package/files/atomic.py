"""Writing a file whole or not at all."""

from __future__ import annotations

import contextlib
import os
import stat
import tempfile
from pathlib import Path

from tensionlib.errors import TensionlibError


class FileWriteError(TensionlibError, OSError):
    """A file that could not be written; what stood there before is still whole."""


def write_atomic(path: str | os.PathLike[str], data: bytes) -> None:
    """Put `data` in the file at `path`, so that a reader finds the old file or the new, never part.

    The bytes go to a temporary file in the same folder, are forced to the disk, and take the
    file's name in one step. The mode of a file that is replaced is kept, and a symbolic link stays
    a link: the file it leads to is replaced.

    Raises
    ------
    FileWriteError
        When the folder or the file does not allow it, or the disk does not take it. The old file
        is whole and the temporary one is gone.
    """
    target = Path(os.path.realpath(path))
    mode = _mode_for(target)
    try:
        handle, temporary = tempfile.mkstemp(dir=target.parent, prefix=f".{target.name}.")
    except OSError as error:
        raise FileWriteError(
            f"{target.name}: the folder {str(target.parent)!r} takes no new file"
            f" ({_why(error)}); nothing was written. Make the folder writable, or save elsewhere"
        ) from error
    try:
        with os.fdopen(handle, "wb") as stream:
            stream.write(data)
            stream.flush()
            os.chmod(temporary, mode)
            os.fsync(stream.fileno())
        os.replace(temporary, target)
    except OSError as error:
        _remove(temporary)
        raise FileWriteError(
            f"{target.name}: could not be written ({_why(error)}); what stood there is unchanged"
        ) from error
    except BaseException:
        _remove(temporary)
        raise
    _sync_folder(target.parent)


def _mode_for(target: Path) -> int:
    """The mode the new file gets; refuses a file that is closed to writing."""
    try:
        found = target.stat()
    except FileNotFoundError:
        mask = os.umask(0)
        os.umask(mask)
        return 0o666 & ~mask
    except OSError as error:
        raise FileWriteError(f"{target.name}: cannot be reached ({_why(error)})") from error
    if not stat.S_ISREG(found.st_mode):
        raise FileWriteError(f"{target.name}: is not a file that can be replaced")
    if not os.access(target, os.W_OK):
        raise FileWriteError(
            f"{target.name}: the file is read-only; nothing was written. Make it writable first"
        )
    return stat.S_IMODE(found.st_mode)


def _sync_folder(folder: Path) -> None:
    """Force the new name to the disk too, where the system can do that for a folder."""
    with contextlib.suppress(OSError):
        handle = os.open(folder, os.O_RDONLY)
        try:
            os.fsync(handle)
        finally:
            os.close(handle)


def _remove(temporary: str) -> None:
    with contextlib.suppress(OSError):
        os.unlink(temporary)


def _why(error: OSError) -> str:
    return error.strerror or type(error).__name__
