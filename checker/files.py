"""Files written whole or not at all."""

import os
import stat
from collections.abc import Iterable
from pathlib import Path

NEW_FILE_MODE = 0o666


def write_whole(path: Path, pieces: Iterable[bytes]) -> None:
    """Put the pieces in place of the file `path`, or leave it as it was if anything fails on the way.

    The mode of a file that exists is kept. What is no plain file, such as a pipe, is written to directly.
    Raises OSError as the system does.
    """
    target = path.resolve()
    mode = _mode(target)
    if mode is not None and not stat.S_ISREG(mode):
        with target.open("wb") as stream:
            stream.writelines(pieces)
        return
    import tempfile

    handle, name = tempfile.mkstemp(prefix=f".{target.stem[:40]}.", suffix=target.suffix, dir=target.parent)
    temporary = Path(name)
    try:
        with os.fdopen(handle, "wb") as stream:
            stream.writelines(pieces)
            stream.flush()
            os.fsync(stream.fileno())
        temporary.chmod(_new_mode() if mode is None else stat.S_IMODE(mode))
        temporary.replace(target)
    except BaseException:
        temporary.unlink(missing_ok=True)
        raise


def _mode(path: Path) -> int | None:
    try:
        return path.stat().st_mode
    except FileNotFoundError:
        return None


def _new_mode() -> int:
    """Return the mode that a new file has here; the system tells its mask only by setting it."""
    mask = os.umask(0)
    os.umask(mask)
    return NEW_FILE_MODE & ~mask
