"""What a command printed and how it ended."""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True)
class Ended:
    """What a command printed and how it ended."""

    code: object
    out: str
    err: str
