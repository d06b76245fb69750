"""Files that appear whole or not at all."""

import os
import tempfile
from pathlib import Path

from exposure.errors import ExposureError


def write_whole(path, content: bytes):
    """Write bytes beside the target and move them into its place.

    Raises
    ------
    ExposureError
        The place cannot be written to.
    """
    path = Path(path)
    try:
        handle, name = tempfile.mkstemp(prefix=f".{path.name}-", dir=path.parent)
    except OSError as error:
        raise ExposureError(f"{path} cannot be written: {error.strerror}") from None
    try:
        with os.fdopen(handle, "wb") as file:
            file.write(content)
        os.chmod(name, 0o644)
        os.replace(name, path)
    except BaseException:
        os.unlink(name)
        raise
