"""Where the formulas stand and what was read of them; the same few sentences for every family."""

from __future__ import annotations

from collections.abc import Callable
from functools import partial

from fleet.formula import Formula, Limit, Num, Status, formula

SECTION_VIII_1 = "ASME BPVC Section VIII Division 1"
MECHANICS = "mechanics of materials"

ANY = "any edition; the form is the same in all that were seen reproduced"
OLDER = "before 2010 (the year is from memory)"
NEWER = "2010 and later (the year is from memory)"
FIRST_NEWER_YEAR = 2010
"""First edition year whose thick-wall forms are taken to be the newer ones (from memory)."""

READ = "handbooks, course notes and worked sheets that reproduce the clause; the code itself was not read"
TEXTBOOK = "textbooks of mechanics of materials"
ALGEBRA = "the inside form of the same clause, written for the radius or diameter that stays"
MEMORY = "memory; not seen in any page that was read"
OURS = "choice of this project"


def figure(
    clause: str,
    *,
    gives: str,
    unit: str,
    standard: str = SECTION_VIII_1,
    edition: str = ANY,
    status: Status = "confirmed",
    source: str = READ,
    limits: tuple[Limit, ...] = (),
) -> Callable[[Callable[..., Num]], Formula]:
    """Enter a formula with what most formulas of this package have in common.

    Parameters
    ----------
    clause, gives, unit, standard, edition, status, source : str
        As in `fleet.formula.formula` [text].
    limits : tuple of Limit
        Domain limits first, then proportions [-].

    Returns
    -------
    callable
        The decorator.
    """
    return formula(
        gives=gives, unit=unit, clause=clause, standard=standard,
        edition=edition, status=status, source=source, limits=limits,
    )  # fmt: skip


wall = partial(figure, gives="t", unit="mm")
pressure = partial(figure, gives="P", unit="MPa")
stress = partial(figure, gives="sigma", unit="MPa")
