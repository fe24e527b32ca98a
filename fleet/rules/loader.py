"""Read rule sets from their data files."""

from __future__ import annotations

import tomllib
from dataclasses import dataclass
from functools import cache
from pathlib import Path
from typing import Any

from fleet.errors import OurFault, UnknownTag

DATA = Path(__file__).parent / "data"

DESIGN_CODES: dict[str, str] = {
    "asme8-1": "ASME Boiler and Pressure Vessel Code, Section VIII, Division 1",
    "membrane": "plain mechanics: thin-wall membrane with joint efficiency",
}
"""Pressure codes that the register may name."""

STATUSES = ("confirmed", "secondary", "from memory", "ours")
_NOT_A_RULE_SET = {"choices"}


@dataclass(frozen=True)
class RuleValue:
    """One value of a rule set.

    Parameters
    ----------
    name : str
        Its name; physical values end in their unit [text].
    value : float
        The value, in `unit` [-].
    unit, meaning, clause, status, source : str
        What it is, where it stands and how well that is known [text].
    """

    name: str
    value: float
    unit: str
    meaning: str
    clause: str
    status: str
    source: str


@dataclass(frozen=True)
class RuleSet:
    """A dated set of rule values.

    Parameters
    ----------
    name, title, edition, dated : str
        What it is called and which text it follows [text].
    values : dict of str to RuleValue
        The values by name [-].
    """

    name: str
    title: str
    edition: str
    dated: str
    values: dict[str, RuleValue]

    def __getitem__(self, name: str) -> float:
        """Give a value by its name."""
        return self.values[name].value


def rule_set_names() -> tuple[str, ...]:
    """List the in-service rule sets that a vessel may name.

    Returns
    -------
    tuple of str
        Names in alphabetical order [text].

    Examples
    --------
    >>> rule_set_names()
    ('api510',)
    """
    return tuple(sorted(path.stem for path in DATA.glob("*.toml") if path.stem not in _NOT_A_RULE_SET))


@cache
def load_rule_set(name: str) -> RuleSet:
    """Read a rule set.

    Parameters
    ----------
    name : str
        Name of the rule set, or ``choices`` for the choices of this project [text].

    Returns
    -------
    RuleSet

    Raises
    ------
    UnknownTag
        If there is no rule set of that name.
    OurFault
        If a value of the file lacks its clause, status or source.

    Examples
    --------
    >>> load_rule_set("api510")["loss_factor"]
    2.0
    >>> load_rule_set("api510").values["loss_factor"].status
    'secondary'
    """
    path = DATA / f"{name}.toml"
    if not path.is_file():
        known = ", ".join((*rule_set_names(), *sorted(_NOT_A_RULE_SET)))
        raise UnknownTag(
            f"rule set {name!r}", "no rule set of that name is installed", f"use one of: {known}"
        )
    document = tomllib.loads(path.read_text(encoding="utf-8"))
    head = {key: str(document.pop(key)) for key in ("name", "title", "edition", "dated")}
    return RuleSet(values={key: _value(path, key, entry) for key, entry in document.items()}, **head)


def rule_status(name: str) -> str:
    """Say how well the values of a rule set are known.

    Parameters
    ----------
    name : str
        Name of the rule set [text].

    Returns
    -------
    str
        The statuses that occur, best known first [text].

    Examples
    --------
    >>> rule_status("api510")
    'secondary'
    """
    found = {value.status for value in load_rule_set(name).values.values()}
    return ", ".join(status for status in STATUSES if status in found)


def _value(path: Path, key: str, entry: dict[str, Any]) -> RuleValue:
    fields = ("value", "unit", "meaning", "clause", "status", "source")
    if set(entry) != set(fields) or entry["status"] not in STATUSES:
        raise OurFault(
            f"{path.name}, [{key}]",
            "a field is missing, unknown or has no known status",
            "mend the data file",
        )
    return RuleValue(key, float(entry["value"]), *(str(entry[field]) for field in fields[1:]))
