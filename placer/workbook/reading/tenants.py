"""Rows of the sheet tenants to tenants; those only volumes name have no cap."""

from collections.abc import Iterable

from placer.estate import Tenant
from placer.workbook.reading.names import Names
from placer.workbook.reading.remarks import Remarks
from placer.workbook.reading.table import Row
from placer.workbook.sheets.demand import CAP


def read_tenants(
    rows: Iterable[Row], volumes: Iterable[Row], remarks: Remarks
) -> tuple[Tenant, ...]:
    """Return the tenants of the sheet, then those that only volumes name."""
    names = Names("tenant", remarks)
    listed = []
    for row in rows:
        listed.append(_tenant(row))
        if row.given("tenant"):
            names.add(row.text("tenant"), row.place("tenant"))
    return (*listed, *_unlisted(volumes, names, remarks))


def _tenant(row: Row) -> Tenant:
    tenant = Tenant(
        name=row.text("tenant"),
        requests_cap=row.whole("requests cap"),
        rate_cap=row.whole("MB/s cap"),
        plan_for_cap=row.text("plan for") == CAP,
        place=row.place("tenant"),
    )
    capped = tenant.requests_cap or tenant.rate_cap or row.faulty
    if tenant.plan_for_cap and not capped:
        row.error(
            "blank",
            "plan for",
            f'the tenant "{tenant.name}" is to be planned for its cap, but has none',
            "fill in a cap, or plan for what was measured",
        )
    return tenant


def _unlisted(
    volumes: Iterable[Row], names: Names, remarks: Remarks
) -> Iterable[Tenant]:
    for row in volumes:
        name, place = row.text("tenant"), row.place("tenant")
        if name and names.meet(name, place):
            remarks.warn(
                "unknown",
                place,
                f'the tenant "{name}" is not in the sheet tenants and has no cap',
                "add it to the sheet tenants",
            )
            yield Tenant(name=name, place=place)
