"""Every setting of the program: its default, its unit and what it does. Read once, when the app is made."""

from __future__ import annotations

import os
from collections.abc import Mapping
from typing import Annotated

from pydantic import BaseModel, ConfigDict, Field

PREFIX = "STILLCOLD_"


class Settings(BaseModel):
    """Settings, each from an environment variable of its name in capitals behind ``STILLCOLD_``."""

    model_config = ConfigDict(extra="forbid", frozen=True)

    workers: Annotated[int, Field(ge=1, le=64, description="Threads that work out answers.")] = os.cpu_count() or 2
    queue_length: Annotated[int, Field(ge=1, le=10000, description="Questions that may wait for a thread.")] = 64
    retry_after_s: Annotated[
        int, Field(ge=1, le=600, description="What a caller is told when the queue is full. [s]")
    ] = 2
    body_limit_bytes: Annotated[
        int, Field(ge=1000, le=100_000_000, description="Largest request that is read. [bytes]")
    ] = 4_000_000
    data_folder: Annotated[
        str, Field(description="Where compiled code is kept when the program's own folder is read-only.")
    ] = ""


def read_settings(environment: Mapping[str, str]) -> Settings:
    """Settings from an environment; what is not there has its default. Raises ``ValidationError``."""
    names = {name: PREFIX + name.upper() for name in Settings.model_fields}
    return Settings.model_validate({name: environment[key] for name, key in names.items() if key in environment})
