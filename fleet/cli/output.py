"""Where words go: one JSON document or plain text to stdout, everything else to stderr."""

from __future__ import annotations

import json
from typing import Any

import typer

from fleet.errors import FleetError
from fleet.words import CAUTION, Notice


class Page:
    """What has been printed so far by this command.

    Parameters
    ----------
    as_json : bool
        Whether the command promised exactly one JSON document [-].
    """

    def __init__(self, *, as_json: bool) -> None:
        self.as_json = as_json
        self.printed = False

    def document(self, content: Any) -> None:
        """Print the one JSON document.

        Parameters
        ----------
        content : object
            What to print; it must hold no NaN [-].
        """
        typer.echo(json.dumps(content, allow_nan=False, indent=2))
        self.printed = True


_state: dict[str, Page] = {}


def begin(*, as_json: bool) -> Page:
    """Start a page for a command.

    Parameters
    ----------
    as_json : bool
        Whether the command promised exactly one JSON document [-].

    Returns
    -------
    Page
    """
    _state["page"] = Page(as_json=as_json)
    return _state["page"]


def page() -> Page:
    """Give the page of the running command.

    Returns
    -------
    Page
    """
    return _state["page"] if _state else begin(as_json=False)


def show(content: Any) -> None:
    """Print the one JSON document of this command, and the caution beside it.

    Parameters
    ----------
    content : object
        What to print; it must hold no NaN [-].
    """
    aside(CAUTION)
    page().document(content)


def say(text: str) -> None:
    """Print text to stdout.

    Parameters
    ----------
    text : str
        What to print; its end of line is added where it lacks one [text].
    """
    typer.echo(text, nl=not text.endswith("\n"))


def aside(text: str) -> None:
    """Print text to stderr: caution, progress, errors.

    Parameters
    ----------
    text : str
        What to print [text].
    """
    typer.echo(text, err=True)


def notices(found: tuple[Notice, ...] | list[Notice], heading: str) -> str:
    """Set out faults, doubts or gaps, one under another.

    Parameters
    ----------
    found : sequence of Notice
        What to set out [-].
    heading : str
        The line above them [text].

    Returns
    -------
    str
        Empty if there is nothing to set out.

    Examples
    --------
    >>> from fleet.words import notice
    >>> print(notices([notice("missing unit", "north.csv, cell E1", "'thickness'")], "Faults"))
    Faults (1)
      north.csv, cell E1
        missing unit: 'thickness'
        to do: write the unit in the header, for instance 'thickness [mm]'
    """
    if not found:
        return ""
    lines = [f"{heading} ({len(found)})"]
    for one in found:
        lines += [f"  {one.where}", f"    {one.code}: {one.found}", f"    to do: {one.remedy}"]
    return "\n".join(lines)


def error(problem: FleetError) -> None:
    """Print an error in its three parts, and its document where one was promised and none was printed.

    Parameters
    ----------
    problem : FleetError
        The error [-].
    """
    aside(f"fleet: {problem.where}\n  found: {problem.what}\n  to do: {problem.remedy}")
    faults, doubts = tuple(getattr(problem, "faults", ())), tuple(getattr(problem, "doubts", ()))
    for text in (notices(faults, "Faults"), notices(doubts, "Doubts")):
        if text:
            aside(text)
    if page().as_json and not page().printed:
        body = problem.as_dict()
        if faults or doubts:
            body["faults"] = [one.as_dict() for one in faults]
            body["doubts"] = [one.as_dict() for one in doubts]
        page().document({"error": body})
