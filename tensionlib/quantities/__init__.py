"""Units in and out: quantities, their roles, reading them from text, and how they are printed.

Inside the library numbers are floats in N, mm, MPa, rad and kg. They become quantities only where
a user gives or reads them.
"""

from tensionlib.quantities.door import count, door, factor
from tensionlib.quantities.formatting import (
    LINE_FIGURES,
    SUMMARY_FIGURES,
    format_number,
    format_utilisation,
    format_value,
    latex_value,
)
from tensionlib.quantities.parsing import parse, steps, values
from tensionlib.quantities.quantity import Quantity, quantity
from tensionlib.quantities.roles import (
    ANGLE,
    AREA,
    CODE,
    COUNT,
    DENSITY,
    ELASTIC_MODULUS,
    FACTOR,
    FORCE,
    FORCE_PER_LENGTH,
    INERTIA,
    LENGTH,
    MASS,
    MASS_PER_LENGTH,
    MODULUS,
    MOMENT,
    NAMED_ROLES,
    PRESSURE,
    STRESS,
    VOLUME,
    WEIGHT_DENSITY,
    WEIGHT_PER_LENGTH,
    WELD_STRENGTH,
    Role,
    role_of,
)
from tensionlib.quantities.views import METRIC, US, DisplayUnit, View

__all__ = [
    "ANGLE",
    "AREA",
    "CODE",
    "COUNT",
    "DENSITY",
    "ELASTIC_MODULUS",
    "FACTOR",
    "FORCE",
    "FORCE_PER_LENGTH",
    "INERTIA",
    "LENGTH",
    "LINE_FIGURES",
    "MASS",
    "MASS_PER_LENGTH",
    "METRIC",
    "MODULUS",
    "MOMENT",
    "NAMED_ROLES",
    "PRESSURE",
    "STRESS",
    "SUMMARY_FIGURES",
    "US",
    "VOLUME",
    "WEIGHT_DENSITY",
    "WEIGHT_PER_LENGTH",
    "WELD_STRENGTH",
    "DisplayUnit",
    "Quantity",
    "Role",
    "View",
    "count",
    "door",
    "factor",
    "format_number",
    "format_utilisation",
    "format_value",
    "latex_value",
    "parse",
    "quantity",
    "role_of",
    "steps",
    "values",
]
