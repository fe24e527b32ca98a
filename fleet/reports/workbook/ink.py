"""How the workbook looks: one ink, two faces, thin rules; each style made once and kept under a name."""

from __future__ import annotations

from typing import TYPE_CHECKING, Literal, get_args

if TYPE_CHECKING:
    from openpyxl.styles import Border, NamedStyle, PatternFill
    from openpyxl.workbook import Workbook

INK = "FF16213A"
"""Blue-black: the one ink."""
OCHRE = "FFC08A1E"
"""The one bar of colour, beside the sentence that relief is set above what the wall carries today."""
FACE = "Arial"
"""Face of tables."""
PROSE = "Times New Roman"
"""Face of titles and sentences."""

Role = Literal[
    "title", "prose", "strong", "note", "line", "group", "head", "head tag", "head number", "block",
    "tag", "cell", "cell right", "number", "total", "date",
]  # fmt: skip
"""What a cell is for; each has a style of its own name, numbers one per count of decimals."""

_SIZES: dict[str, float] = {"title": 18, "prose": 12, "strong": 12, "note": 8, "block": 10, "line": 9}
_RULED = {
    **dict.fromkeys(("head", "head tag", "head number", "total"), "medium"),
    **dict.fromkeys(("tag", "cell", "cell right", "number", "date"), "hair"),
    "group": "thin",
}
_BOLD = {"total", "strong", "head", "head tag", "head number", "group", "block"}
_RIGHT = {"number", "total", "head number", "cell right"}
_INDENTED = {"title", "prose", "strong", "note", "line", "tag", "head tag"}
_WRAPPED = {"head tag", "prose", "strong", "head", "head number", "cell", "cell right", "tag", "line"}
_PATTERNS = {"date": "yyyy-mm-dd", "cell right": "@_)", "head number": "@_)", "total": "0_)"}


def number_format(decimals: int) -> str:
    """Give the number format for a count of decimals, with a hair of space behind the number.

    Parameters
    ----------
    decimals : int
        Decimals printed [count].

    Returns
    -------
    str

    Examples
    --------
    >>> number_format(3), number_format(0)
    ('0.000_)', '0_)')
    """
    return ("0." + "0" * decimals if decimals > 0 else "0") + "_)"


def lay_out_styles(book: Workbook) -> None:
    """Make every style of the workbook; they are then used by name.

    Parameters
    ----------
    book : Workbook
        The workbook [-].
    """
    from openpyxl.styles import Font

    # openpyxl has no public way to the default style, on whose digits Excel counts the width of columns
    normal = book._named_styles["Normal"]  # type: ignore[attr-defined]  # noqa: SLF001
    normal.font = Font(name=FACE, size=10, color=INK)
    normal.bind(book)
    for role in get_args(Role):
        book.add_named_style(_style(role, role))
    for decimals in range(5):
        book.add_named_style(_style(number_style(decimals), "number", number_format(decimals)))


def number_style(decimals: int) -> str:
    """Name the style of a number.

    Parameters
    ----------
    decimals : int
        Decimals printed [count].

    Returns
    -------
    str
    """
    return f"number {number_format(decimals)}"


def rule(strokes: int) -> Border:
    """Draw the rule of a standing at the two sides of a narrow cell.

    Parameters
    ----------
    strokes : int
        None to four [count].

    Returns
    -------
    Border
        A double line counts as two strokes.
    """
    from openpyxl.styles import Border, Side

    kinds: dict[int, tuple[str | None, str | None]] = {
        0: (None, None),
        1: (None, "thin"),
        2: (None, "double"),
        3: ("thin", "double"),
        4: ("double", "double"),
    }
    left, right = (
        Side(style=kind, color=INK) if kind else Side()  # type: ignore[arg-type]  # the names are openpyxl's own
        for kind in kinds[strokes]
    )
    return Border(left=left, right=right)


def stair(*, left: bool, top: bool, inside: bool) -> Border:
    """Draw a cell's share of the heavy stair of the timetable.

    Parameters
    ----------
    left, top : bool
        On which sides the stair runs [-].
    inside : bool
        Whether the cell belongs to the table and keeps the thin line beneath it [-].

    Returns
    -------
    Border
    """
    from openpyxl.styles import Border, Side

    heavy, hair, nothing = Side(style="thick", color=INK), Side(style="hair", color=INK), Side()
    return Border(
        left=heavy if left else nothing, top=heavy if top else nothing, bottom=hair if inside else nothing
    )


def ochre() -> PatternFill:
    """Fill the one bar of ochre."""
    from openpyxl.styles import PatternFill

    return PatternFill("solid", start_color=OCHRE, end_color=OCHRE)


def _style(name: str, role: Role, pattern: str = "General") -> NamedStyle:
    from openpyxl.styles import Alignment, Border, Font, NamedStyle, Side

    style = NamedStyle(name=name)
    face = PROSE if role in {"title", "prose", "strong"} else FACE
    style.font = Font(
        name=face, size=_SIZES.get(role, 8), bold=role in _BOLD, color=INK, italic=role == "note"
    )
    style.alignment = Alignment(
        horizontal="right" if role in _RIGHT else "left",
        vertical="bottom" if role in {"head", "head tag", "head number", "total", "block"} else "top",
        indent=1 if role in _INDENTED else 0,
        wrap_text=role in _WRAPPED,
    )
    if role in _RULED:
        style.border = Border(bottom=Side(style=_RULED[role], color=INK))  # type: ignore[arg-type]  # openpyxl's names
    style.number_format = _PATTERNS.get(role, pattern)
    return style
