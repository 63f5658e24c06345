"""Text of a file, packed or not, in UTF-8; what is in the way is said by its place."""

from __future__ import annotations

import gzip
import zlib
from os import PathLike
from pathlib import Path

from polywalk.errors import FileError

Source = str | PathLike[str]


def text_of(path: Source) -> str:
    """The whole text of a file; gzip is recognised by its first bytes, not by the name.

    Raises
    ------
    FileError
        Not there, not readable, packed and cut short, empty, or not UTF-8: with the line of the first wrong byte.
    """
    raw = _bytes(path)
    if raw.startswith((b"\xff\xfe", b"\xfe\xff")):
        raise FileError(f"{path}: expected UTF-8, got UTF-16; save it as UTF-8.", path)
    try:
        text = raw.decode("utf-8-sig")
    except UnicodeDecodeError as error:
        line = raw.count(b"\n", 0, error.start) + 1
        wrong = f"the byte 0x{raw[error.start]:02x}"
        raise FileError(f"{path}, line {line}: expected UTF-8, got {wrong}; save it as UTF-8.", path, line) from None
    if not text.strip():
        raise FileError(f"{path}: expected a model, got an empty file.", path)
    if "\0" in text:
        line = text.count("\n", 0, text.index("\0")) + 1
        raise FileError(
            f"{path}, line {line}: expected text, got a zero byte; is this another kind of file?", path, line
        )
    return text


def _bytes(path: Source) -> bytes:
    if not isinstance(path, str | PathLike):
        raise FileError(f"expected the path of a file, got {path!r}.", path)
    try:
        raw = Path(path).read_bytes()
        return gzip.decompress(raw) if raw.startswith(b"\x1f\x8b") else raw
    except (EOFError, zlib.error, gzip.BadGzipFile) as error:
        raise FileError(f"{path}: the gzip file is damaged or cut short ({error}); fetch it again.", path) from None
    except OSError as error:
        reason = error.strerror or str(error)
        raise FileError(f"{path}: {reason}; give the path of a readable file.", path) from None


def put_text(path: Source, text: str) -> None:
    """Write the whole text, packed where the name ends in .gz.

    Raises
    ------
    FileError
        Where it cannot be written.
    """
    raw = text.encode("utf-8")
    try:
        Path(path).write_bytes(gzip.compress(raw, mtime=0) if str(path).endswith(".gz") else raw)
    except OSError as error:
        reason = error.strerror or str(error)
        raise FileError(f"{path}: {reason}; give a path that can be written.", path) from None
