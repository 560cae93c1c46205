"""Sheets that say more of the volumes: classes, tenants, load hour by hour."""

from placer.estate import Importance
from placer.units import Side
from placer.workbook.column import NOT_LIMITED, Column, Effect, Kind, Sheet

IMPORTANCE = tuple(importance.value for importance in Importance)
MEASURED = "measured"
CAP = "cap"

CLASSES = Sheet(
    name="classes",
    meaning="what a class of service asks; fills blank cells of its volumes",
    columns=(
        Column(
            name="class",
            kind=Kind.ID,
            required=True,
            synonyms=("service class", "class of service"),
            meaning="name of the class",
        ),
        Column(
            name="response limit",
            kind=Kind.NUMBER,
            unit="ms",
            side=Side.SUPPLY,
            highest=60000,
            synonyms=("response target", "latency limit"),
            meaning="highest mean response of an hour",
        ),
        Column(
            name="importance",
            kind=Kind.WORD,
            words=IMPORTANCE,
            meaning="how much its waiting counts",
        ),
        Column(
            name="hold",
            kind=Kind.COUNT,
            unit="days",
            side=Side.DEMAND,
            highest=366,
            meaning="how long the old copy is kept after the cutover",
        ),
    ),
)

TENANTS = Sheet(
    name="tenants",
    meaning="what all volumes of a tenant together may ask for; without a row: no cap",
    columns=(
        Column(
            name="tenant",
            kind=Kind.ID,
            required=True,
            synonyms=("tenant name", "name"),
            meaning="name of the tenant",
        ),
        Column(
            name="requests cap",
            kind=Kind.NUMBER,
            unit="1/s",
            default=NOT_LIMITED,
            side=Side.DEMAND,
            lowest=1,
            highest=10**8,
            synonyms=("iops cap", "iops limit"),
            meaning="requests per second its volumes together are let through",
        ),
        Column(
            name="MB/s cap",
            kind=Kind.NUMBER,
            unit="MB/s",
            default=NOT_LIMITED,
            side=Side.DEMAND,
            lowest=1,
            highest=10**7,
            synonyms=("throughput cap", "bandwidth cap"),
            meaning="bytes per second its volumes together are let through",
        ),
        Column(
            name="plan for",
            kind=Kind.WORD,
            words=(MEASURED, CAP),
            default=MEASURED,
            effect=Effect.BUSY,
            meaning="measured: what was measured, up to the cap; cap: what it may ask",
        ),
    ),
)

LOAD = Sheet(
    name="load",
    meaning="load hour by hour; without it the busy hour holds all day",
    columns=(
        Column(
            name="array",
            kind=Kind.ID,
            required=True,
            synonyms=("array name", "storage array", "storage system"),
            meaning="array of the volume",
        ),
        Column(
            name="volume",
            kind=Kind.ID,
            required=True,
            synonyms=("volume name", "lun", "name"),
            meaning="volume the row speaks of",
        ),
        Column(
            name="day",
            kind=Kind.DAY,
            synonyms=("weekday", "date"),
            meaning="Mon to Sun, or a date; blank: every day",
        ),
        Column(
            name="hour begins",
            kind=Kind.COUNT,
            required=True,
            highest=23,
            synonyms=("hour",),
            meaning="0 to 23: the hour from then on",
        ),
        Column(
            name="zone",
            kind=Kind.ZONE,
            default="zone of the policy",
            derived=True,
            synonyms=("time zone",),
            meaning="time zone of the hour",
        ),
        Column(
            name="reads",
            kind=Kind.NUMBER,
            unit="1/s",
            required=True,
            side=Side.DEMAND,
            highest=10**7,
            synonyms=("read requests", "read iops"),
            meaning="reads per second, mean of the hour",
        ),
        Column(
            name="writes",
            kind=Kind.NUMBER,
            unit="1/s",
            required=True,
            side=Side.DEMAND,
            highest=10**7,
            synonyms=("write requests", "write iops"),
            meaning="writes per second, mean of the hour",
        ),
        Column(
            name="read size",
            kind=Kind.NUMBER,
            unit="KiB",
            default="size of the busy hour",
            derived=True,
            side=Side.DEMAND,
            highest=65536,
            effect=Effect.RESPONSE,
            synonyms=("mean read size",),
            meaning="mean size of a read",
        ),
        Column(
            name="write size",
            kind=Kind.NUMBER,
            unit="KiB",
            default="size of the busy hour",
            derived=True,
            side=Side.DEMAND,
            highest=65536,
            effect=Effect.RESPONSE,
            synonyms=("mean write size",),
            meaning="mean size of a write",
        ),
    ),
)
