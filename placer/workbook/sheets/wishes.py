"""Sheets that say what is asked of the plan: rules, nights, policy, control totals."""

from placer.estate import Aim, RuleKind
from placer.units import Side
from placer.workbook.column import GB_MEANS, NOT_LIMITED, Column, Effect, Kind, Sheet

RULES = Sheet(
    name="rules",
    meaning="relations the plan must keep",
    columns=(
        Column(
            name="what",
            kind=Kind.TEXT,
            required=True,
            meaning="volume A1/V1; A1/V2 - or application, host, tenant NAME - or role "
            "log",
        ),
        Column(
            name="rule",
            kind=Kind.WORD,
            required=True,
            words=tuple(kind.value for kind in RuleKind),
            meaning="only on, never on (with where); apart, together",
        ),
        Column(
            name="where",
            kind=Kind.TEXT,
            default="pool",
            derived=True,
            meaning="pool A1/P1, media flash, array A1, site S1; apart, together: "
            "pool, array or site",
        ),
        Column(name="why", kind=Kind.TEXT, meaning="repeated in the plan"),
    ),
)

_SPAN = (
    Column(
        name="from",
        kind=Kind.DATE,
        synonyms=("valid from",),
        meaning="first day; blank: the start date",
    ),
    Column(
        name="until",
        kind=Kind.DATE,
        synonyms=("valid until",),
        meaning="last day, included; blank: 26 weeks after the start date",
    ),
)

_ZONE = Column(
    name="zone",
    kind=Kind.ZONE,
    default="zone of the policy",
    derived=True,
    synonyms=("time zone",),
    meaning="time zone, as in the zone database",
)

WINDOWS = Sheet(
    name="windows",
    meaning="when copies and cutovers may happen",
    columns=(
        Column(
            name="window",
            kind=Kind.TEXT,
            required=True,
            synonyms=("name",),
            meaning="name of the window",
        ),
        Column(
            name="opens on",
            kind=Kind.TEXT,
            required=True,
            synonyms=("days",),
            meaning="Fri - or Mon-Thu - or daily - or a rule of RFC 5545, FREQ=...",
        ),
        Column(
            name="opens at",
            kind=Kind.CLOCK,
            required=True,
            meaning="local time, hh:mm",
        ),
        Column(
            name="lasts",
            kind=Kind.NUMBER,
            unit="h",
            side=Side.SUPPLY,
            highest=168,
            meaning="hours it lasts; or give closes at",
        ),
        Column(
            name="closes at",
            kind=Kind.CLOCK,
            meaning="local time, hh:mm; the next day if not after opens at",
        ),
        _ZONE,
        *_SPAN,
        Column(
            name="copies together",
            kind=Kind.NUMBER,
            unit="MB/s",
            default=NOT_LIMITED,
            side=Side.SUPPLY,
            highest=10**6,
            meaning="rate of all copies in this window",
        ),
        Column(
            name="copies at once",
            kind=Kind.COUNT,
            default=NOT_LIMITED,
            highest=10_000,
            meaning="copies that may run at the same time in this window",
        ),
        Column(
            name="cutovers at most",
            kind=Kind.COUNT,
            default="4",
            highest=10_000,
            effect=Effect.NIGHTS,
            meaning="applications cut over in one night",
        ),
        Column(
            name="arrays",
            kind=Kind.LIST,
            meaning="arrays it is for; blank: all",
        ),
    ),
)

FREEZES = Sheet(
    name="freezes",
    meaning="when nothing may be copied or cut over",
    columns=(
        Column(
            name="freeze",
            kind=Kind.TEXT,
            required=True,
            synonyms=("name",),
            meaning="name of the freeze",
        ),
        Column(
            name="starts on",
            kind=Kind.TEXT,
            required=True,
            synonyms=("days",),
            meaning="days, as in opens on of the windows",
        ),
        Column(
            name="starts at",
            kind=Kind.CLOCK,
            default="00:00",
            meaning="local time, hh:mm",
        ),
        Column(
            name="lasts",
            kind=Kind.NUMBER,
            unit="h",
            side=Side.DEMAND,
            highest=8784,
            meaning="hours it lasts; or give ends at",
        ),
        Column(
            name="ends at",
            kind=Kind.CLOCK,
            meaning="local time, hh:mm; the next day if not after starts at",
        ),
        _ZONE,
        *_SPAN,
        Column(name="why", kind=Kind.TEXT, meaning="repeated in the plan"),
    ),
)

SETTINGS = (
    Column(
        name="start date",
        kind=Kind.DATE,
        default="the day of reading",
        derived=True,
        effect=Effect.NIGHTS,
        meaning="first day of the plan",
    ),
    Column(
        name="zone",
        kind=Kind.ZONE,
        default="UTC",
        effect=Effect.NIGHTS,
        synonyms=("time zone",),
        meaning="time zone of the plan, as in the zone database",
    ),
    Column(
        name="growth horizon",
        kind=Kind.COUNT,
        unit="months",
        default="12",
        highest=120,
        effect=Effect.GROWTH,
        meaning="how far ahead the placement must hold",
    ),
    Column(
        name="budget",
        kind=Kind.NUMBER,
        unit="money",
        default="0",
        side=Side.SUPPLY,
        highest=10**12,
        effect=Effect.GOALS,
        meaning="money there is for expansion",
    ),
    Column(name="currency", kind=Kind.TEXT, meaning="written beside sums of money"),
    Column(
        name="aim",
        kind=Kind.WORD,
        words=tuple(aim.value for aim in Aim),
        default=Aim.BEST_USE.value,
        effect=Effect.GOALS,
        meaning="best use: relief first; least change: few moves first",
    ),
    Column(
        name="least gain",
        kind=Kind.PERCENT,
        unit="%",
        default="30",
        highest=100,
        effect=Effect.GOALS,
        meaning="gain of response from which a move counts",
    ),
    Column(
        name="relief given up for fewer moves",
        kind=Kind.PERCENT,
        unit="%",
        default="5",
        highest=100,
        effect=Effect.GOALS,
        meaning="share of the relief that may be given up for less effort",
    ),
    Column(
        name="tolerance on limits",
        kind=Kind.PERCENT,
        unit="%",
        default="10",
        highest=1000,
        effect=Effect.GOALS,
        meaning="on response limits only: how far over its limit a volume still "
        "counts as served; room and load have no tolerance",
    ),
    Column(
        name="cured by",
        kind=Kind.DATE,
        meaning="last day on which a limit broken today may still be broken",
    ),
    Column(
        name="hold",
        kind=Kind.COUNT,
        unit="days",
        default="14",
        side=Side.DEMAND,
        highest=366,
        effect=Effect.COPYING,
        meaning="how long the old copy is kept after the cutover",
    ),
    Column(
        name="change lead",
        kind=Kind.COUNT,
        unit="working days",
        default="10",
        highest=260,
        effect=Effect.NIGHTS,
        meaning="working days (Mon to Fri) from the start date to the first copy",
    ),
    Column(
        name="finish by",
        kind=Kind.DATE,
        meaning="last day of cutovers",
    ),
    Column(
        name="nights kept free",
        kind=Kind.PERCENT,
        unit="%",
        default="20",
        side=Side.DEMAND,
        highest=99,
        effect=Effect.COPYING,
        meaning="share of the nights kept for what goes wrong",
    ),
    Column(
        name="cutover, check and back-out",
        kind=Kind.COUNT,
        unit="min",
        default="60",
        highest=1440,
        effect=Effect.COPYING,
        meaning="time one cutover needs inside its window",
    ),
    Column(
        name="one cutover counts as",
        kind=Kind.NUMBER,
        unit="GiB",
        default="10",
        side=Side.DEMAND,
        highest=10**6,
        effect=Effect.GOALS,
        meaning="effort of one cutover, in GiB copied",
    ),
    Column(
        name="latent demand",
        kind=Kind.RATIO,
        default="1.5",
        side=Side.DEMAND,
        lowest=1,
        highest=5,
        effect=Effect.BUSY,
        meaning="load on flash over the load measured, where spinning drives could "
        "not serve more",
    ),
    Column(
        name=GB_MEANS,
        kind=Kind.WORD,
        words=("10^9", "2^30"),
        meaning="needed once where a heading says GB or TB and ours says GiB",
    ),
    Column(
        name="seed",
        kind=Kind.COUNT,
        default="1",
        highest=2**31 - 1,
        meaning="start of the solver's random numbers",
    ),
    Column(
        name="time limit",
        kind=Kind.COUNT,
        unit="s",
        default="60",
        lowest=1,
        highest=86_400,
        meaning="longest search",
    ),
)

POLICY = Sheet(
    name="policy",
    meaning="settings of the whole plan, one per row",
    columns=(
        Column(name="setting", kind=Kind.TEXT, required=True, meaning="which setting"),
        Column(name="value", kind=Kind.ANY, meaning="its value; blank: the default"),
    ),
)

CONTROL = Sheet(
    name="control",
    of_totals=True,
    meaning="totals from another source; they must agree with the volumes read",
    columns=(
        Column(
            name="what",
            kind=Kind.ID,
            required=True,
            meaning="name of an array, or all",
        ),
        Column(name="volumes", kind=Kind.COUNT, meaning="number of volumes"),
        Column(
            name="provisioned",
            kind=Kind.NUMBER,
            unit="GiB",
            highest=10**11,
            synonyms=("size", "capacity"),
            meaning="sum of the sizes the hosts see",
        ),
        Column(
            name="requests",
            kind=Kind.NUMBER,
            unit="1/s",
            highest=10**11,
            synonyms=("iops",),
            meaning="sum of the requests of the busy hours",
        ),
    ),
)
