"""Every exception of fleet, drawn as a tree.

::

    FleetError                    exit code
    |- Refused                    1   the request was understood and cannot be granted
    |  |- UnknownTag              1   no vessel, part, location or device of that name
    |  |- FileRefused             1   a file with faults; carries them all
    |  |- CheckFailed             1   a check of the record found something
    |  `- OutsideLimits           1   a formula was asked outside its limits
    |- UsageProblem               2   the words of the command are off
    |- DatabaseProblem            3   the database cannot be opened, read or written
    |  `- RecordIsClosed          3   somebody tried to change a fact
    `- OurFault                   70  a state that should not occur

Each exception says three things: *where* it happened, *what* was found (with the number), and *what to do*.
The exit code is an attribute of the exception, so that only the command line has to know how to end.
"""

from __future__ import annotations

from collections.abc import Sequence
from typing import Any


class FleetError(Exception):
    """Report bad news in three parts.

    Parameters
    ----------
    where : str
        The place: a file and cell, a tag, a database, a formula [text].
    what : str
        What was found there, with the number [text].
    remedy : str
        What the reader can do about it [text].

    Examples
    --------
    >>> error = Refused("vessel D-101", "it is retired", "name a vessel in service")
    >>> str(error)
    'vessel D-101: it is retired; name a vessel in service'
    >>> error.exit_code
    1
    """

    exit_code = 70

    def __init__(self, where: str, what: str, remedy: str) -> None:
        super().__init__(where, what, remedy)
        self.where = where
        self.what = what
        self.remedy = remedy

    def __str__(self) -> str:
        return f"{self.where}: {self.what}; {self.remedy}"

    def as_dict(self) -> dict[str, Any]:
        """Give the three parts and the kind, for ``--json``."""
        return {"error": type(self).__name__, "where": self.where, "found": self.what, "remedy": self.remedy}


class Refused(FleetError):
    """Say that a request was understood and cannot be granted."""

    exit_code = 1


class UnknownTag(Refused):
    """Say that no vessel, part, location or device has that name."""


class FileRefused(Refused):
    """Refuse a file and carry every fault and doubt that was found in it.

    Parameters
    ----------
    where, what, remedy : str
        As in `FleetError` [text].
    faults : sequence of object
        The faults, each a `fleet.words.Notice` [-].
    doubts : sequence of object
        The doubts, each a `fleet.words.Notice` [-].
    """

    def __init__(
        self, where: str, what: str, remedy: str, faults: Sequence[Any] = (), doubts: Sequence[Any] = ()
    ) -> None:
        super().__init__(where, what, remedy)
        self.args = (where, what, remedy, tuple(faults), tuple(doubts))
        self.faults = tuple(faults)
        self.doubts = tuple(doubts)


class CheckFailed(Refused):
    """Say that a check of the record found something."""


class OutsideLimits(Refused):
    """Say that a formula was asked outside its limits, and what takes over."""


class UsageProblem(FleetError):
    """Say that the words of the command are off."""

    exit_code = 2


class DatabaseProblem(FleetError):
    """Say that the database cannot be opened, read or written."""

    exit_code = 3


class RecordIsClosed(DatabaseProblem):
    """Say that somebody tried to change or delete a fact."""


class OurFault(FleetError):
    """Say that the program is in a state that should not occur."""

    exit_code = 70
