"""Files that are replaced in one step, so that none is ever half-written."""

from __future__ import annotations

import os
import tempfile
from pathlib import Path

from polywalk.errors import DrawingError

PICTURES = (".png", ".svg", ".pdf")


def target_of(path: Path, endings: tuple[str, ...] = PICTURES) -> Path:
    """The path, if a file with one of the endings can be written there; raises DrawingError."""
    if path.suffix.lower() not in endings:
        raise DrawingError(f"expected a file ending in {', '.join(endings)}, got {path.name!r}.", culprit=path)
    if not path.parent.is_dir():
        raise DrawingError(f"the folder {str(path.parent)!r} does not exist; create it first.", culprit=path)
    if path.is_dir():
        raise DrawingError(f"{str(path)!r} is a folder; name a file.", culprit=path)
    return path


def write(target: Path, data: bytes) -> None:
    """Replace a file in one step: written beside it, then put in its place; raises DrawingError."""
    part = None
    try:
        with tempfile.NamedTemporaryFile(dir=target.parent, suffix=target.suffix, delete=False) as file:
            part = Path(file.name)
            file.write(data)
        part.chmod(0o644)  # a temporary file is private; a picture is for sharing
        os.replace(part, target)
    except OSError as error:
        raise DrawingError(f"{str(target)!r} could not be written ({error.strerror}).", culprit=target) from error
    finally:
        if part is not None:
            part.unlink(missing_ok=True)
