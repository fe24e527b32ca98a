"""Show the installed rule sets: every value with its clause, its status and its source."""

from __future__ import annotations

from typing import Any

from fleet.rules import RuleSet, load_rule_set, rule_set_names

CHOICES = "choices"
"""The name under which the choices of this project are shown [text]."""


def rule_set_document(name: str | None) -> Any:
    """Give a rule set as a document, or the names of all.

    Parameters
    ----------
    name : str or None
        The rule set; None for a list of all [text].

    Returns
    -------
    dict or list

    Raises
    ------
    UnknownTag
        If there is no rule set of that name.

    Examples
    --------
    >>> rule_set_document("api510")["values"][0]["name"]
    'internal_cap_years'
    """
    if name is None:
        return [
            {"name": one.name, "title": one.title, "edition": one.edition, "dated": one.dated}
            for one in _all()
        ]
    rules = load_rule_set(name)
    return {
        "name": rules.name,
        "title": rules.title,
        "edition": rules.edition,
        "dated": rules.dated,
        "values": [
            {
                "name": value.name,
                "value": value.value,
                "unit": value.unit,
                "meaning": value.meaning,
                "clause": value.clause,
                "status": value.status,
                "source": value.source,
            }
            for value in rules.values.values()
        ],
    }


def rule_set_text(name: str | None) -> str:
    """Set out a rule set for reading, or the names of all.

    Parameters
    ----------
    name : str or None
        The rule set; None for a list of all [text].

    Returns
    -------
    str

    Raises
    ------
    UnknownTag
        If there is no rule set of that name.

    Examples
    --------
    >>> print(rule_set_text(None).splitlines()[0])
    api510   API 510, Pressure Vessel Inspection Code, 10th edition numbering
    """
    if name is None:
        return "\n".join(f"{one.name:<8} {one.title}, {one.edition}" for one in _all())
    rules = load_rule_set(name)
    lines = [f"{rules.title}, {rules.edition} ({rules.dated})", ""]
    for value in rules.values.values():
        unit = "" if value.unit == "-" else f" {value.unit}"
        lines += [
            f"{value.name} = {value.value:g}{unit}",
            f"    {value.meaning}",
            f"    clause {value.clause}; {value.status}; {value.source}",
        ]
    return "\n".join(lines)


def _all() -> list[RuleSet]:
    return [load_rule_set(name) for name in (*rule_set_names(), CHOICES)]
