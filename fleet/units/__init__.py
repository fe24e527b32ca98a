"""Units at the rim: text to mm, MPa, °C, mm/year and degrees, and back; rounding to the safe side.

Pressures are gauge pressures throughout. Units that need no conversion never import pint.
"""

from fleet.rounding import round_down, round_up
from fleet.units.converting import as_written, from_internal, parse_number, parse_quantity, to_internal
from fleet.units.display import SI, US, Display, Side, display
from fleet.units.spellings import INTERNAL, SPELLINGS, Given, Unit, UnitFault, find_unit, parse_unit

__all__ = [
    "INTERNAL",
    "SI",
    "SPELLINGS",
    "US",
    "Display",
    "Given",
    "Side",
    "Unit",
    "UnitFault",
    "as_written",
    "display",
    "find_unit",
    "from_internal",
    "parse_number",
    "parse_quantity",
    "parse_unit",
    "round_down",
    "round_up",
    "to_internal",
]
