"""Writing a file whole or not at all, and saying in plain words why a file could not be read or written."""

import errno
import os
import secrets
from pathlib import Path

from shaftcore.errors import FileAccessError

REASONS = {
    errno.ENOENT: "there is no such file or folder",
    errno.ENOTDIR: "a part of its path is no folder",
    errno.EISDIR: "it is a folder",
    errno.EACCES: "permission is denied",
    errno.EPERM: "permission is denied",
    errno.EROFS: "the disk is read-only",
    errno.ENOSPC: "the disk is full",
    errno.EDQUOT: "the space allowed on this disk is used up",
    errno.ENAMETOOLONG: "its name is too long",
    errno.ELOOP: "its links lead back to themselves",
}


def write_whole_file(path: Path, content: bytes) -> None:
    """Write beside `path`, flush to the disk, then put it in place: a failed write leaves the old file.

    A link is followed to its file, and the rights of an existing file are kept. Raises FileAccessError.
    """
    beside = None
    try:
        target = Path(os.path.realpath(path))
        if target.exists() and not os.access(target, os.W_OK):
            raise PermissionError(errno.EACCES, "")
        beside = target.with_name(f".{secrets.token_hex(8)}.part")
        with beside.open("xb") as file:
            file.write(content)
            file.flush()
            os.fsync(file.fileno())
        if target.exists():
            beside.chmod(target.stat().st_mode & 0o7777)
        os.replace(beside, target)
    except (OSError, ValueError) as error:
        raise FileAccessError(
            f"{path} could not be saved: {reason_of(error)}. What stood there before is untouched; "
            "save under another name or in another folder."
        ) from error
    finally:
        if beside is not None:
            _removed(beside)


def read_at_most(path: Path, most: int) -> bytes:
    """The first `most` bytes of a file. Raises FileAccessError."""
    try:
        with path.open("rb") as file:
            return file.read(most)
    except (OSError, ValueError) as error:
        raise FileAccessError(f"{path} could not be read: {reason_of(error)}; check its name and place.") from error


def reason_of(error: OSError | ValueError) -> str:
    """Why the system refused, in plain words."""
    if isinstance(error, OSError):
        return REASONS.get(error.errno or 0, error.strerror or type(error).__name__)
    return "its name holds a character no file name may have"


def _removed(beside: Path) -> None:
    """Take away what was written beside unless it is in place; where even that fails there is nothing more to do."""
    try:
        beside.unlink(missing_ok=True)
    except OSError:
        return
