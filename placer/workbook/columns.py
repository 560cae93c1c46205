"""The one table of sheets and columns: reader, blank workbook, guides use it."""

from placer.workbook.column import Sheet
from placer.workbook.sheets.demand import CLASSES, LOAD, TENANTS
from placer.workbook.sheets.machines import ARRAYS, HOSTS, ROUTES
from placer.workbook.sheets.pools import POOLS
from placer.workbook.sheets.volumes import VOLUMES
from placer.workbook.sheets.wishes import (
    CONTROL,
    FREEZES,
    POLICY,
    RULES,
    SETTINGS,
    WINDOWS,
)

__all__ = ["GUIDE", "SETTINGS", "SHEETS", "sheet"]

GUIDE = "guide"
SHEETS = (
    VOLUMES,
    POOLS,
    ARRAYS,
    POLICY,
    WINDOWS,
    CLASSES,
    TENANTS,
    LOAD,
    HOSTS,
    ROUTES,
    RULES,
    FREEZES,
    CONTROL,
)


def sheet(name: str) -> Sheet:
    """Return a sheet of the inventory by its name."""
    return next(sheet for sheet in SHEETS if sheet.name == name)
