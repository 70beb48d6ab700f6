"""Units at the border: reading typed quantities, the closed list, digits for print."""

from lineproof.quantity.typed import QuantityInput, Typed, echo, read_quantity
from lineproof.quantity.units import UNITS, Unit, factor, internal_factor, registry, unit_named

__all__ = [
    "UNITS",
    "QuantityInput",
    "Typed",
    "Unit",
    "echo",
    "factor",
    "internal_factor",
    "read_quantity",
    "registry",
    "unit_named",
]
