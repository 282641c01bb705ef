"""Compile plain functions of numbers and arrays to machine code.

The functions also run as they stand (set ``NUMBA_DISABLE_JIT=1``), for debugging and for coverage.
They release the interpreter lock, so that several worker threads solve at the same time.
"""

from collections.abc import Callable
from typing import TypeVar, cast

import numba

_Function = TypeVar("_Function", bound=Callable[..., object])


def compiled(function: _Function) -> _Function:
    """Compile a function on its first call and keep the machine code for later processes."""
    return cast(_Function, numba.njit(cache=True, nogil=True, error_model="numpy")(function))


def compiled_inline(function: _Function) -> _Function:
    """Like ``compiled``, for a function of a few lines that is called in the innermost loop."""
    return cast(
        _Function, numba.njit(cache=True, nogil=True, error_model="numpy", inline="always")(function)
    )
