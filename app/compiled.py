"""Compile plain functions of numbers and arrays to machine code, and keep it for later processes.

The functions also run as they stand (set ``NUMBA_DISABLE_JIT=1``), for debugging and for coverage. They
release the interpreter lock, so that several worker threads solve at the same time.

Machine code is kept in a folder named after the text of all compiled modules: the compiler looks only at the
file of a function itself, and would go on using code into which an older version of another file was built.
"""

from __future__ import annotations

import hashlib
import os
import tempfile
from collections.abc import Callable
from pathlib import Path
from typing import TypeVar, cast

import numba

_Function = TypeVar("_Function", bound=Callable[..., object])
_APP = Path(__file__).parent


def code_folder() -> Path:
    """Where machine code is kept: beside the program, or in the data folder when that is read-only."""
    texts = [Path(__file__), *sorted(_APP.glob("engine/*.py")), *sorted(_APP.glob("physics/*.py"))]
    digest = hashlib.sha256(b"".join(path.read_bytes() for path in texts)).hexdigest()[:16]
    home = _APP / "__pycache__"
    if not os.access(_APP, os.W_OK):
        home = Path(os.environ.get("STILLCOLD_DATA_FOLDER") or tempfile.gettempdir()) / "stillcold"
    return home / f"compiled-{digest}"


setattr(numba.config, "CACHE_DIR", str(code_folder()))  # noqa: B010  the attribute has no declared type


def compiled(function: _Function) -> _Function:
    """Compile a function on its first call and keep the machine code for later processes."""
    return cast(_Function, numba.njit(cache=True, nogil=True, error_model="numpy")(function))


def compiled_inline(function: _Function) -> _Function:
    """Like ``compiled``, for a function of a few lines that is called in the innermost loop."""
    return cast(_Function, numba.njit(cache=True, nogil=True, error_model="numpy", inline="always")(function))
