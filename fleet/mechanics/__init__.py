"""Pressure, wall and stress for each shape and code. Pure: arrays and floats in, arrays and floats out.

One family of formulas a module; `rating` chooses among them by code, edition, shape and radius kept.
Importing the package enters every formula in `fleet.formula.REGISTER`.
"""

from fleet.mechanics import (
    cone,
    cover,
    cylinder,
    ellipsoidal,
    lame,
    liquid,
    membrane_cylinder,
    membrane_sphere,
    sphere,
    thick_axial,
    thick_cylinder,
    thick_sphere,
    torispherical,
)

__all__ = [
    "cone",
    "cover",
    "cylinder",
    "ellipsoidal",
    "lame",
    "liquid",
    "membrane_cylinder",
    "membrane_sphere",
    "sphere",
    "thick_axial",
    "thick_cylinder",
    "thick_sphere",
    "torispherical",
]
