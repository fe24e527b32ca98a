"""From the name of a unit system, as a person gives it, to the units that are printed."""

from __future__ import annotations

from fleet import units


def display(name: str) -> units.Display:
    """Find what ``--units`` names.

    Parameters
    ----------
    name : {'si', 'us'}
        The unit system [text].

    Returns
    -------
    units.Display

    Raises
    ------
    UsageProblem
        If the name is neither.

    Examples
    --------
    >>> display("us").unit("pressure")
    'psi'
    """
    return units.display(name)


def counted(number: int, thing: str) -> str:
    """Write a number and what it counts, with the plural where there is not one.

    Parameters
    ----------
    number : int
        How many [count].
    thing : str
        The word for one of them [text].

    Returns
    -------
    str

    Examples
    --------
    >>> counted(1, "reading"), counted(3, "relief device")
    ('1 reading', '3 relief devices')
    """
    return f"{number} {thing}" if number == 1 else f"{number} {thing}s"
