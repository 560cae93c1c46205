"""The estate of the ferry company: a harbour hall, an inland hall, what they store.

All names and figures are made up; the sizes are those of a middling company (common
practice, no source).
"""

from csv import DictReader
from dataclasses import dataclass

# Share of the busy hour in each hour of the day, from midnight on.
SHAPES: dict[str, tuple[int, ...]] = {
    "day": (
        *(12, 10, 10, 10, 12, 20, 35, 60, 85, 100, 98, 90),
        *(75, 85, 95, 92, 85, 70, 50, 40, 32, 26, 20, 15),
    ),
    "gates": (
        *(15, 10, 8, 10, 25, 70, 100, 95, 60, 45, 45, 50),
        *(55, 50, 48, 60, 90, 98, 75, 50, 40, 32, 25, 20),
    ),
    "night": (
        *(70, 90, 100, 95, 80, 50, 20, 12, 10, 10, 10, 10),
        *(10, 10, 10, 10, 10, 12, 15, 18, 22, 30, 45, 60),
    ),
}


@dataclass(frozen=True)
class Family:
    """Volumes of one kind: size [GiB], requests [1/s], shares [%], ``kib`` each."""

    prefix: str
    count: int
    pool: str
    application: str
    hosts: int
    service: str
    size: tuple[int, int]
    filled: int
    requests: tuple[int, int]
    reads: int
    kib: int
    shape: str
    growth: int


_TABLE = """\
prefix,count,pool,application,hosts,service,size,filled,requests,reads,kib,shape,growth
tk-db,4,quay/fast,tickets,2,counter,400-600,80,500-900,70,12,gates,10
bk-web,4,quay/fast,booking,4,counter,200-300,60,200-400,85,16,day,10
bk-log,3,quay/fast,booking,3,counter,150-250,70,90-140,5,16,day,10
mx,6,quay/fast,mail,2,office,600-800,80,60-100,60,24,day,10
ts-a,5,quay/fast,test copies A,1,archive,500-800,85,5-15,60,32,,10
ts-b,5,quay/fast,test copies B,1,archive,500-800,85,5-15,60,32,,10
fs,6,quay/fast,,2,office,700-1000,80,8-25,80,48,day,15
bk-db,6,quay/bulk,booking,3,counter,400-650,85,42-70,75,8,day,10
man-db,3,quay/bulk,manifests,2,deck,250-450,80,25-42,70,8,day,10
man-log,1,quay/fast,manifests,1,deck,250-450,80,25-42,5,8,day,10
cam,9,quay/bulk,cameras,3,archive,1800-2500,90,11-17,15,256,,10
bak,5,quay/bulk,,1,archive,2000-2600,80,8-14,20,256,night,10
pay-db,3,depot/swift,payroll,1,office,200-400,75,150-300,65,8,day,10
st-db,4,depot/swift,stores,2,deck,300-500,75,120-220,70,8,day,10
ts-c,4,depot/swift,test copies C,1,archive,300-440,85,5-15,60,32,,10
rp-web,3,depot/swift,reports,2,office,300-500,60,80-160,90,24,day,10
arc,12,depot/deep,,2,archive,1300-2200,85,1-4,70,64,,10
buoy,5,depot/deep,,1,office,80-160,70,4-9,40,16,,10
wx,4,depot/deep,weather feeds,1,deck,100-200,70,22-40,50,16,,10
cr-db,4,depot/deep,crew rosters,2,deck,200-400,75,35-60,75,8,gates,10
rp-db,6,depot/deep,reports,2,office,400-700,75,12-25,85,64,night,10
gate-db,6,old-pier/mast,ticket gates,2,counter,200-350,75,90-150,65,8,gates,10
lg,8,old-pier/mast,,2,deck,220-320,85,25-45,10,16,,10
mir,2,old-pier/mast,tide tables,2,deck,300-400,80,60-90,75,8,gates,10
draw,1,old-pier/hold,drawings,1,office,2400-2400,92,6-6,80,64,day,10
scan,7,old-pier/hold,,2,office,480-680,90,4-9,85,64,day,10
doc,7,old-pier/hold,paper archive,1,archive,480-680,90,3-8,80,48,,10
lost,5,old-pier/hold,lost property,1,office,60-120,75,2-6,85,24,day,10
"""


def _family(row: dict[str, str]) -> Family:
    def span(name: str) -> tuple[int, int]:
        low, high = row[name].split("-")
        return int(low), int(high)

    return Family(
        prefix=row["prefix"],
        count=int(row["count"]),
        pool=row["pool"],
        application=row["application"],
        hosts=int(row["hosts"]),
        service=row["service"],
        size=span("size"),
        filled=int(row["filled"]),
        requests=span("requests"),
        reads=int(row["reads"]),
        kib=int(row["kib"]),
        shape=row["shape"],
        growth=int(row["growth"]),
    )


FAMILIES = tuple(map(_family, DictReader(_TABLE.splitlines())))

CLASSES: tuple[dict[str, object], ...] = (
    {
        "class": "counter",
        "response limit (ms)": 3,
        "importance": "vital",
        "hold (days)": 14,
    },
    {
        "class": "deck",
        "response limit (ms)": 20,
        "importance": "high",
        "hold (days)": 7,
    },
    {
        "class": "office",
        "response limit (ms)": 30,
        "importance": "normal",
        "hold (days)": 7,
    },
    {"class": "archive", "importance": "low", "hold (days)": 3},
)

ARRAYS: tuple[dict[str, object], ...] = (
    {
        "array": "quay",
        "site": "harbour",
        "controllers": 2,
        "reads at most (1/s per controller)": 24_000,
        "writes at most (1/s per controller)": 11_000,
        "MB/s per controller": 2_400,
        "write answer (us)": 350,
        "read hit answer (us)": 150,
        "cache (GiB)": 256,
        "controller busy measured (%)": 15,
        "one copy at most (MB/s)": 200,
        "all copies in together (MB/s)": 400,
        "all copies out together (MB/s)": 400,
        "copies at once": 4,
    },
    {
        "array": "depot",
        "site": "inland",
        "controllers": 2,
        "reads at most (1/s per controller)": 16_000,
        "writes at most (1/s per controller)": 7_000,
        "MB/s per controller": 1_600,
        "write answer (us)": 450,
        "read hit answer (us)": 180,
        "cache (GiB)": 128,
        "one copy at most (MB/s)": 150,
        "all copies in together (MB/s)": 300,
        "all copies out together (MB/s)": 300,
        "copies at once": 3,
        "volumes at most": 60,
    },
    {
        "array": "old-pier",
        "site": "harbour",
        "controllers": 2,
        "reads at most (1/s per controller)": 5_000,
        "writes at most (1/s per controller)": 2_200,
        "MB/s per controller": 400,
        "write answer (us)": 900,
        "controller busy measured (%)": 23,
        "one copy at most (MB/s)": 50,
        "all copies in together (MB/s)": 150,
        "all copies out together (MB/s)": 150,
        "copies at once": 3,
        "largest volume (GiB)": 2_500,
    },
)

_FLASH: dict[str, object] = {
    "media": "flash",
    "data per stripe": 4,
    "parity per stripe": 2,
    "drive size (GB)": 1920,
    "reduction here": "1.5:1",
    "writes in place": "no",
    "read time idle (us)": 180,
    "write time idle (us)": 60,
    "reads at most (1/s per drive)": 60_000,
    "writes at most (1/s per drive)": 20_000,
    "MB/s per drive": 450,
    "warranty (years)": 5,
    "life asked (years)": 4,
}
_SPINNING: dict[str, object] = {
    "media": "spinning",
    "data per stripe": 6,
    "parity per stripe": 2,
    "rpm": 7200,
    "seek (ms)": 8.5,
    "MB/s per drive": 150,
}

POOLS: tuple[dict[str, object], ...] = (
    {
        **_FLASH,
        "pool": "fast",
        "array": "quay",
        "pool busy measured (%)": 2.5,
        "drives without spares": 12,
        "drive writes per day": 0.5,
        "wear used (%)": 88,
        "drives per step": 6,
        "price per step": 48_000,
        "steps at most": 2,
        "delivery (weeks)": 4,
        "ready after delivery (days)": 3,
    },
    {
        **_SPINNING,
        "pool": "bulk",
        "array": "quay",
        "pool busy measured (%)": 52,
        "drives without spares": 40,
        "drive size (GB)": 2000,
    },
    {
        **_FLASH,
        "pool": "swift",
        "array": "depot",
        "pool busy measured (%)": 1.7,
        "drives without spares": 6,
        "drive size (GB)": 960,
        "drive writes per day": 0.5,
        "wear used (%)": 84,
        "drives per step": 6,
        "price per step": 45_000,
        "steps at most": 1,
        "delivery (weeks)": 6,
        "ready after delivery (days)": 3,
    },
    {
        **_SPINNING,
        "pool": "deep",
        "array": "depot",
        "pool busy measured (%)": 55,
        "drives without spares": 24,
        "drive size (GB)": 2000,
    },
    {
        **_SPINNING,
        "pool": "mast",
        "array": "old-pier",
        "pool busy measured (%)": 60.5,
        "drives without spares": 24,
        "data per stripe": 1,
        "parity per stripe": 1,
        "drive size (GB)": 600,
        "rpm": 10_000,
        "seek (ms)": 4.2,
    },
    {
        **_SPINNING,
        "pool": "hold",
        "array": "old-pier",
        "pool busy measured (%)": 17,
        "drives without spares": 16,
        "drive size (GB)": 1000,
    },
)

ROUTES: tuple[dict[str, object], ...] = (
    {"from": "harbour", "to": "harbour", "one copy at most (MB/s)": 200},
    {
        "from": "harbour",
        "to": "inland",
        "one copy at most (MB/s)": 100,
        "together (MB/s)": 200,
    },
    {
        "from": "inland",
        "to": "harbour",
        "one copy at most (MB/s)": 100,
        "together (MB/s)": 200,
    },
)

RULES: tuple[dict[str, object], ...] = (
    {
        "what": "volume old-pier/mir-01; old-pier/mir-02",
        "rule": "apart",
        "where": "array",
        "why": "the tide tables survive the loss of an array",
    },
    {
        "what": "application manifests",
        "rule": "together",
        "where": "array",
        "why": "they are copied to the customs office as one",
    },
    {
        "what": "application payroll",
        "rule": "only on",
        "where": "site inland",
        "why": "agreed with the staff council",
    },
    {
        "what": "application cameras",
        "rule": "never on",
        "where": "media flash",
        "why": "pictures are written once",
    },
    {
        "what": "application drawings",
        "rule": "never on",
        "where": "array old-pier",
        "why": "the old array goes back next year, the drawings leave first",
    },
)

WINDOWS: tuple[dict[str, object], ...] = (
    {
        "window": "weeknight",
        "opens on": "FREQ=WEEKLY;BYDAY=TU,TH",
        "opens at": "22:00",
        "lasts (h)": 6,
        "copies at once": 4,
        "cutovers at most": 4,
    },
    {
        "window": "Saturday",
        "opens on": "Sat",
        "opens at": "20:00",
        "closes at": "08:00",
        "copies together (MB/s)": 600,
        "copies at once": 6,
        "cutovers at most": 6,
    },
)

FREEZES: tuple[dict[str, object], ...] = (
    {
        "freeze": "closing of the month",
        "starts on": "FREQ=MONTHLY;BYMONTHDAY=-2",
        "starts at": "06:00",
        "lasts (h)": 72,
        "why": "the books are closed",
    },
)

POLICY: dict[str, object] = {
    "start date": "2027-01-11",
    "zone": "Europe/Berlin",
    "growth horizon (months)": 12,
    "budget": 60_000,
    "currency": "EUR",
    "aim": "best use",
    "cured by": "2027-03-31",
    "finish by": "2027-03-20",
    "change lead (working days)": 10,
    "seed": 1,
    "time limit (s)": 30,
}
