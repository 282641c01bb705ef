"""A small pool of threads that work out answers, with a bounded queue before it.

The compiled loop releases the interpreter lock, so threads share the cores; a full queue is answered at once with
``TooBusy``, never with a hang.
"""

from __future__ import annotations

import asyncio
import threading
from collections.abc import Callable
from concurrent.futures import ThreadPoolExecutor
from typing import ParamSpec, TypeVar

from app.errors import TooBusy

_Given = ParamSpec("_Given")
_Result = TypeVar("_Result")


class Workers:
    """Runs functions off the event loop, at most ``threads`` at a time and ``queue_length`` waiting."""

    def __init__(self, threads: int, queue_length: int, retry_after_s: int) -> None:
        self._pool = ThreadPoolExecutor(threads, thread_name_prefix="answers")
        self._places = threading.Semaphore(threads + queue_length)
        self._retry_after_s = retry_after_s

    async def ask(self, function: Callable[_Given, _Result], *args: _Given.args, **named: _Given.kwargs) -> _Result:
        """The result of a function that runs in a thread. Raises ``TooBusy`` when no place is free."""
        if not self._places.acquire(blocking=False):
            raise TooBusy(self._retry_after_s)
        future = self._pool.submit(function, *args, **named)
        future.add_done_callback(lambda _: self._places.release())
        return await asyncio.wrap_future(future)

    def start(self, function: Callable[[], None]) -> None:
        """Run a function in the background and forget it."""
        self._pool.submit(function)

    def close(self) -> None:
        """Let running work end and start no more."""
        self._pool.shutdown(wait=False, cancel_futures=True)
