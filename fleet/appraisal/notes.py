"""A book of doubts and gaps, kept as arrays and written out vessel by vessel only when somebody looks."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np

from fleet.appraisal.inputs import Bools, Inputs, Ints
from fleet.words import Notice, notice


@dataclass(frozen=True)
class _Block:
    code: str
    level: str
    rows: Ints
    found: Callable[[int], str]
    quiet: bool


class NoteBook:
    """Collect notices of an appraisal.

    Parameters
    ----------
    inputs : Inputs
        Register and record, for names and for what hangs on what [-].
    """

    def __init__(self, inputs: Inputs) -> None:
        self._inputs = inputs
        self._blocks: list[_Block] = []
        self._by_vessel: dict[int, list[tuple[_Block, int]]] | None = None
        self._recorded: dict[int, list[tuple[int, Notice]]] = {}
        for entry in inputs.recorded:
            self._recorded.setdefault(entry.vessel, []).append((entry.location, entry.notice))

    def add(
        self, code: str, level: str, where: Bools, found: str | Callable[[int], str], *, quiet: bool = False
    ) -> None:
        """Note something for every flagged row.

        Parameters
        ----------
        code : str
            A code of the catalogue [text].
        level : {'vessel', 'part', 'location'}
            What the rows are [text].
        where : ndarray of bool
            The flagged rows [-].
        found : str or callable
            What was found, or a function of the row that says it [text].
        quiet : bool
            Whether it is said beside the location only, not in the vessel's own list [-].
        """
        rows = np.flatnonzero(where)
        if len(rows):
            text = found if callable(found) else (lambda _row, words=found: words)
            self._blocks.append(_Block(code, level, rows, text, quiet))
            self._by_vessel = None

    def _vessel_of(self, block: _Block) -> Ints:
        parts, place = self._inputs.parts, self._inputs.locations
        if block.level == "vessel":
            return block.rows
        if block.level == "part":
            return parts.vessel[block.rows]
        return parts.vessel[place.part[block.rows]]

    def _where(self, block: _Block, row: int) -> str:
        inputs = self._inputs
        if block.level == "vessel":
            return str(inputs.vessels.tag[row])
        part = row if block.level == "part" else int(inputs.locations.part[row])
        text = f"{inputs.vessels.tag[inputs.parts.vessel[part]]} / {inputs.parts.part[part]}"
        return text if block.level == "part" else f"{text} / {inputs.locations.location[row]}"

    def of_vessel(self, vessel: int) -> list[tuple[int, bool, Notice]]:
        """Write out what is noted for a vessel.

        Parameters
        ----------
        vessel : int
            Index of the vessel [-].

        Returns
        -------
        list of tuple
            Index of the location or -1, whether it is said beside the location only, and the notice. What stands
            on record already is not said twice.
        """
        if self._by_vessel is None:
            index: dict[int, list[tuple[_Block, int]]] = {}
            for block in self._blocks:
                for owner, row in zip(self._vessel_of(block).tolist(), block.rows.tolist(), strict=True):
                    index.setdefault(owner, []).append((block, row))
            self._by_vessel = index
        recorded = self._recorded.get(vessel, [])
        said = {(location, entry.code) for location, entry in recorded}
        out: list[tuple[int, bool, Notice]] = []
        for block, row in self._by_vessel.get(vessel, []):
            location = row if block.level == "location" else -1
            if (location, block.code) in said and block.level != "part":
                continue
            out.append((location, block.quiet, notice(block.code, self._where(block, row), block.found(row))))
        out.extend((location, False, entry) for location, entry in recorded)
        return out
