"""From the tags that people use to the entities of the store; where one is unknown, to the nearest known."""

from __future__ import annotations

import difflib
from dataclasses import dataclass

from fleet.errors import UnknownTag
from fleet.store import models
from fleet.tasks.reader import Reader

Key = tuple[str, int | None, str]


@dataclass(frozen=True)
class Names:
    """Every entity on record, both ways.

    Parameters
    ----------
    by_key : dict
        (kind, parent entity, tag) to entity [count].
    tags : dict
        Entity to (kind, parent entity, tag) [text].
    """

    by_key: dict[Key, int]
    tags: dict[int, Key]

    def vessel(self, tag: str) -> int:
        """Find a vessel.

        Parameters
        ----------
        tag : str
            Its tag [text].

        Returns
        -------
        int
            Its entity.

        Raises
        ------
        UnknownTag
            If there is none of that tag; it names the nearest.
        """
        return self._find("vessel", None, tag, f"vessel {tag!r}", "the register")

    def part(self, vessel: str, part: str) -> int:
        """Find a part of a vessel.

        Parameters
        ----------
        vessel, part : str
            The tag and the name [text].

        Returns
        -------
        int
            Its entity.

        Raises
        ------
        UnknownTag
            If there is none of that name; it names the nearest.
        """
        return self._find("part", self.vessel(vessel), part, f"part {part!r}", f"vessel {vessel}")

    def location(self, vessel: str, part: str, location: str) -> int:
        """Find a location on a part of a vessel.

        Parameters
        ----------
        vessel, part, location : str
            The tag and the names [text].

        Returns
        -------
        int
            Its entity.

        Raises
        ------
        UnknownTag
            If there is none of that name; it names the nearest.
        """
        parent = self.part(vessel, part)
        return self._find(
            "location", parent, location, f"location {location!r}", f"vessel {vessel}, part {part}"
        )

    def children(self, kind: str, parent: int | None) -> dict[str, int]:
        """Give the entities of a kind below a parent.

        Parameters
        ----------
        kind : str
            vessel, part, location or relief device [text].
        parent : int or None
            The parent entity; None for vessels [count].

        Returns
        -------
        dict of str to int
            Tag to entity.
        """
        return {
            tag: entity for (of, above, tag), entity in self.by_key.items() if of == kind and above == parent
        }

    def get(self, vessel: str, part: str | None = None, location: str | None = None) -> int | None:
        """Give an entity by its names, or None where there is none.

        Parameters
        ----------
        vessel, part, location : str or None
            The names, from the outside in [text].

        Returns
        -------
        int or None
        """
        found = self.by_key.get(("vessel", None, vessel))
        if part is not None and found is not None:
            found = self.by_key.get(("part", found, part))
        if location is not None and found is not None:
            found = self.by_key.get(("location", found, location))
        return found

    def path(self, entity: int) -> tuple[str, ...]:
        """Give the names of an entity from the outside in.

        Parameters
        ----------
        entity : int
            The entity [count].

        Returns
        -------
        tuple of str
        """
        _, parent, tag = self.tags[entity]
        return (tag,) if parent is None else (*self.path(parent), tag)

    def _find(self, kind: str, parent: int | None, tag: str, where: str, holder: str) -> int:
        found = self.by_key.get((kind, parent, tag))
        if found is not None:
            return found
        known = sorted(self.children(kind, parent))
        near = nearest(tag, known)
        if near is not None:
            remedy = f"did you mean {near}?"
        elif known:
            remedy = f"{len(known)} are known, for instance {', '.join(known[:5])}"
        else:
            remedy = "load the register first: fleet register load FILE"
        raise UnknownTag(where, f"{holder} holds no {kind} of that name", remedy)


def nearest(tag: str, known: list[str]) -> str | None:
    """Give the known tag that is spelled most like one.

    Parameters
    ----------
    tag : str
        The tag as typed [text].
    known : list of str
        The tags on record [text].

    Returns
    -------
    str or None
        None where nothing comes near.

    Examples
    --------
    >>> nearest("d1203", ["D-1203", "D-1210"])
    'D-1203'
    """
    plain = {_plain(one): one for one in reversed(known)}
    close = difflib.get_close_matches(_plain(tag), list(plain), n=1, cutoff=0.6)
    return plain[close[0]] if close else None


def _plain(tag: str) -> str:
    return "".join(letter for letter in tag.casefold() if letter.isalnum()) or tag.casefold()


def fetch_names(record: Reader) -> Names:
    """Fetch the names of all entities.

    Parameters
    ----------
    record : Reader
        The record at the moment asked about [-].

    Returns
    -------
    Names
    """
    columns = record.rows(models.Entity)
    keys = list(zip(columns["kind"], columns["parent_id"], columns["tag"], strict=True))
    return Names(
        by_key=dict(zip(keys, columns["id"], strict=True)), tags=dict(zip(columns["id"], keys, strict=True))
    )
