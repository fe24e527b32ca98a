"""Plain text of 100 columns: paragraphs, tables, and the rule whose weight marks a standing."""

from __future__ import annotations

import textwrap
from collections.abc import Sequence
from dataclasses import dataclass

from fleet.reports.source import heaviness

WIDTH = 100
"""Columns of a page of text [count]."""
GUTTER = 4
"""Columns kept at the left for the rule of a standing [count]."""
LEAST = 8
"""A column that wraps is not made narrower than this [count]."""


@dataclass(frozen=True)
class Head:
    """One column of a table.

    Parameters
    ----------
    text : str
        Heading; a line break parts the unit from the name [text].
    right : bool
        Whether it holds numbers and stands to the right [-].
    wraps : bool
        Whether its cells may be broken over lines [-].
    """

    text: str
    right: bool = False
    wraps: bool = False


def strokes(standing: str) -> str:
    """Draw the rule of a standing: no stroke for the best, four for the worst.

    Parameters
    ----------
    standing : str
        A standing of the catalogue [text].

    Returns
    -------
    str
        Always as wide as the gutter, the strokes to the right.

    Examples
    --------
    >>> strokes("below required"), strokes("rating held")
    ('││││', '    ')
    """
    return ("│" * heaviness(standing)).rjust(GUTTER)


def paragraph(text: str, *, indent: int = 0, hanging: int = 0) -> list[str]:
    """Break a sentence over lines.

    Parameters
    ----------
    text : str
        The sentence [text].
    indent : int
        Columns before every line [count].
    hanging : int
        Further columns before every line but the first [count].

    Returns
    -------
    list of str

    Examples
    --------
    >>> paragraph("one two", indent=2)
    ['  one two']
    """
    return textwrap.wrap(
        text,
        WIDTH,
        initial_indent=" " * indent,
        subsequent_indent=" " * (indent + hanging),
        break_long_words=False,
        break_on_hyphens=False,
    )


def marked(standing: str, text: str) -> list[str]:
    """Break a sentence over lines with the rule of a standing at their left.

    Parameters
    ----------
    standing : str
        A standing of the catalogue [text].
    text : str
        The sentence [text].

    Returns
    -------
    list of str

    Examples
    --------
    >>> marked("rating short", "rating short: V-1")
    ['  ││ rating short: V-1']
    """
    return [f"{strokes(standing)} {line.strip()}".rstrip() for line in paragraph(text, indent=GUTTER + 1)]


def title(text: str, right: str = "") -> list[str]:
    """Set a title with a thin rule beneath it.

    Parameters
    ----------
    text : str
        The title, at the left [text].
    right : str
        What stands at the right end of the line [text].

    Returns
    -------
    list of str
    """
    room = WIDTH - len(right)
    line = f"{text.ljust(room)}{right}" if len(text) < room else text
    return [line.rstrip(), "─" * WIDTH]


def table(
    heads: Sequence[Head],
    rows: Sequence[Sequence[str]],
    *,
    marks: Sequence[str] | None = None,
    gap: int = 2,
    like: Sequence[Sequence[str]] = (),
) -> list[str]:
    """Set a table; the widest wrapping columns give way until it fits the page.

    Parameters
    ----------
    heads : sequence of Head
        The columns [-].
    rows : sequence of sequence of str
        The cells [text].
    marks : sequence of str, optional
        Standing of each row, for the rule at its left [text].
    gap : int
        Blanks between columns [count].
    like : sequence of sequence of str
        Rows of the same table that stand elsewhere, so that all are set alike [text].

    Returns
    -------
    list of str
        Nothing is ever cut off: a table that cannot be made to fit is wider than the page.

    Examples
    --------
    >>> for line in table([Head("tag"), Head("wall", right=True)], [["V-1", "10.12"]]):
    ...     print(line)
         tag   wall
         V-1  10.12
    """
    widths = _widths(heads, [*rows, *like], WIDTH - GUTTER - 1 - gap * (len(heads) - 1))
    lines = [" " * (GUTTER + 1) + line for line in _set([head.text for head in heads], heads, widths, gap)]
    for number, row in enumerate(rows):
        mark = strokes(marks[number]) if marks else " " * GUTTER
        lines += [f"{mark} {line}" for line in _set(row, heads, widths, gap)]
    return [line.rstrip() for line in lines]


def _widths(heads: Sequence[Head], rows: Sequence[Sequence[str]], room: int) -> list[int]:
    widths = [
        max(len(line) for cell in (head.text, *(row[number] for row in rows)) for line in cell.split("\n"))
        for number, head in enumerate(heads)
    ]
    while sum(widths) > room:
        can_give = [number for number, head in enumerate(heads) if head.wraps and widths[number] > LEAST]
        if not can_give:
            break
        widths[max(can_give, key=lambda number: widths[number])] -= 1
    return widths


def _set(cells: Sequence[str], heads: Sequence[Head], widths: Sequence[int], gap: int) -> list[str]:
    broken = [
        [piece for line in cell.split("\n") for piece in (textwrap.wrap(line, width) or [""])]
        if head.wraps
        else cell.split("\n")
        for cell, head, width in zip(cells, heads, widths, strict=True)
    ]
    tall = max(len(lines) for lines in broken)
    return [
        (" " * gap).join(
            (lines[number] if number < len(lines) else "").rjust(width)
            if head.right
            else (lines[number] if number < len(lines) else "").ljust(width)
            for lines, head, width in zip(broken, heads, widths, strict=True)
        )
        for number in range(tall)
    ]
