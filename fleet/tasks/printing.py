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
