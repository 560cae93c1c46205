"""What the ferry company measured and agreed beside the sizes: caches, tenants, roles.

Made up as the rest of the estate; shares are typical ones (common practice, no source).
"""

from dataclasses import dataclass


@dataclass(frozen=True)
class Habit:
    """How the volumes of a family behave: shares [%], snapshots [% of occupied].

    ``days`` is how long a snapshot is kept.
    """

    random: int | None = None
    hits: int | None = None
    snapshots: int = 0
    days: int | None = None
    tenant: str | None = None
    role: str | None = None


NOTHING = Habit()
HABITS = {
    "tk-db": Habit(hits=30),
    "bk-web": Habit(hits=45),
    "mx": Habit(hits=20, snapshots=5, days=7),
    "fs": Habit(random=40, hits=10, snapshots=8, days=14),
    "man-log": Habit(random=20, role="log"),
    "cam": Habit(random=10),
    "bak": Habit(random=5, role="backup"),
    "st-db": Habit(hits=25, snapshots=5, days=7),
    "rp-web": Habit(hits=40),
    "arc": Habit(random=30),
    "rp-db": Habit(random=60, hits=10),
    "gate-db": Habit(hits=15, tenant="island line"),
    "draw": Habit(tenant="harbour museum"),
    "scan": Habit(random=50, tenant="harbour museum"),
    "doc": Habit(random=50, tenant="harbour museum"),
}

# The island line's cap is new: at the rush hours it asks for more than it will get.
TENANTS: tuple[dict[str, object], ...] = (
    {"tenant": "island line", "requests cap (1/s)": 650},
    {
        "tenant": "harbour museum",
        "requests cap (1/s)": 120,
        "MB/s cap": 10,
        "plan for": "cap",
    },
)

# Mean responses of the busy hour [ms]; all near what the model says of them.
RESPONSES: dict[str, float] = {
    "tk-db-01": 0.25,
    "tk-db-02": 0.23,
    "bk-db-01": 19.5,
    "bk-db-02": 18.2,
    "bk-db-03": 21,
    "st-db-01": 0.26,
    "cr-db-01": 18.5,
    "rp-db-01": 9,
    "wx-01": 10.2,
    "gate-db-01": 7.9,
    "gate-db-02": 7.2,
    "mir-01": 10.5,
}
