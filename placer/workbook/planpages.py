"""The sheets of a plan workbook that are read by people only."""

from collections.abc import Iterable, Sequence

from openpyxl.workbook import Workbook

from placer.estate import Estate, Policy
from placer.findings import Finding, in_order
from placer.plan import Plan
from placer.tally import Night, Share, finish, nights, shares
from placer.words import REASONS, status, stopped
from placer.workbook import style
from placer.workbook.cellkinds import (
    GIBIBYTES,
    MEGABYTES_PER_SECOND,
    MONEY,
    PERCENT,
    TEXT,
    TIME,
    WHOLE,
    Kind,
    Raw,
    escape,
)
from placer.workbook.grid import Grid, Heading
from placer.workbook.plansheets import BOUGHT, GOALS, SUMMARY, Scope

Pair = tuple[str, object, Kind]

ABOUT = "about"
DIGEST, VERSION, STATUS, INVENTORY = "digest", "version", "status", "inventory"
SHEETS = "sheets"
START = "start date"
IDENTITY = (INVENTORY, DIGEST, VERSION, STATUS, START, SHEETS)

_NIGHT: Sequence[Heading] = (
    ("window", TEXT),
    ("opens", TEXT),
    ("closes", TEXT),
    ("copies", WHOLE),
    ("copied (GiB)", GIBIBYTES),
    ("cutovers", WHOLE),
    ("busiest (MB/s)", MEGABYTES_PER_SECOND),
)
_REASON: Sequence[Heading] = (
    ("moves by reason", TEXT),
    ("moves", WHOLE),
    ("copied (GiB)", GIBIBYTES),
    ("why the volume moves", TEXT),
)
_ASSUMPTION: Sequence[Heading] = (
    ("sheet", TEXT),
    ("column", TEXT),
    ("assumed", TEXT),
    ("cells", WHOLE),
    ("effect", TEXT),
)
_FINDING: Sequence[Heading] = (
    ("severity", TEXT),
    ("code", TEXT),
    ("sheet", TEXT),
    ("cell", TEXT),
    ("sentence", TEXT),
    ("remedy", TEXT),
)


def summary(book: Workbook, estate: Estate, plan: Plan, verdict: str) -> None:
    """Write the sheet that says what came out."""
    grid = Grid(book.create_sheet(SUMMARY))
    grid.title(f"Plan for {plan.inventory}")
    grid.line(status(plan), style.BOLD)
    for line in verdict.splitlines():
        grid.line(line)
    grid.gap()
    grid.pairs(_counts(estate, plan), estate.policy.zone)
    grid.gap()
    grid.listing(_REASON, map(_reason, shares(plan)))
    grid.gap()
    grid.table(GOALS, plan.goals, Scope.of(estate))
    if plan.bought:
        grid.gap()
        grid.table(BOUGHT, plan.bought, Scope.of(estate))
    grid.settle()
    style.paper(grid.sheet)


def _reason(share: Share) -> Sequence[Raw]:
    copied = GIBIBYTES.cell(share.copied, "")
    meaning = REASONS.get(share.reason, "")
    return share.reason.value, share.moves, copied, meaning


def _counts(estate: Estate, plan: Plan) -> Iterable[Pair]:
    used = nights(estate, plan)
    return (
        ("volumes", len(estate.volumes), WHOLE),
        ("volumes that move", len(plan.moves), WHOLE),
        ("copied (GiB)", sum(m.size for m in plan.moves), GIBIBYTES),
        ("nights used", len({n.window.night for n in used}), WHOLE),
        ("first night opens", used[0].window.start if used else None, TIME),
        ("last cutover", finish(plan.moves), TIME),
        (
            _money_label("bought", estate.policy),
            sum(b.price for b in plan.bought),
            MONEY,
        ),
        ("moves left over", len(plan.left), WHOLE),
        ("shortages", len(plan.shortages), WHOLE),
    )


def _money_label(label: str, policy: Policy) -> str:
    return f"{label} ({policy.currency})" if policy.currency else label


def night_list(book: Workbook, estate: Estate, plan: Plan) -> None:
    """Write what each window carries."""
    rows = [_night(night) for night in nights(estate, plan)]
    _listing(book, "nights", _NIGHT, rows)


def _night(night: Night) -> Sequence[Raw]:
    window = night.window
    return (
        escape(window.name),
        TIME.cell(window.start, window.zone),
        TIME.cell(window.end, window.zone),
        night.copies,
        GIBIBYTES.cell(night.carried, window.zone),
        night.cutovers,
        MEGABYTES_PER_SECOND.cell(night.busiest, window.zone),
    )


def assumptions(book: Workbook, estate: Estate) -> None:
    """Write the defaults that stood in for empty cells."""
    rows = [
        (escape(a.sheet), escape(a.column), escape(a.value), a.cells, escape(a.effect))
        for a in estate.assumptions
    ]
    _listing(book, "assumptions", _ASSUMPTION, rows)


def findings(book: Workbook, remarks: Iterable[Finding]) -> None:
    """Write the remarks on the inventory and on the plan."""
    rows = [
        (
            f.severity.value,
            f.code,
            escape(f.place.sheet),
            f.place.cell,
            escape(f.sentence),
            escape(f.remedy),
        )
        for f in in_order(remarks)
    ]
    _listing(book, "findings", _FINDING, rows)


def _listing(
    book: Workbook,
    title: str,
    columns: Sequence[Heading],
    rows: Iterable[Sequence[Raw]],
) -> None:
    grid = Grid(book.create_sheet(title))
    grid.listing(columns, rows)
    grid.finish(len(columns))


def about(book: Workbook, estate: Estate, plan: Plan) -> None:
    """Write what identifies the plan, and the policy it was made under."""
    grid = Grid(book.create_sheet(ABOUT))
    grid.header((("setting", TEXT), ("value", TEXT)))
    grid.pairs(_identity(book, plan), estate.policy.zone)
    grid.pairs(_policy(estate.policy), estate.policy.zone)
    grid.finish(2)


def _identity(book: Workbook, plan: Plan) -> Iterable[Pair]:
    return (
        (INVENTORY, plan.inventory, TEXT),
        (DIGEST, plan.digest, TEXT),
        (VERSION, plan.version, TEXT),
        (STATUS, plan.status.value, TEXT),
        (START, plan.start, TEXT),
        ("search ended", stopped(plan).value, TEXT),
        (SHEETS, "; ".join(book.sheetnames), TEXT),
    )


def _policy(policy: Policy) -> Iterable[Pair]:
    return (
        ("start", policy.start, TIME),
        ("first copy not before", policy.earliest, TIME),
        ("zone", policy.zone, TEXT),
        ("growth horizon (months)", policy.horizon_months, WHOLE),
        (_money_label("budget", policy), policy.budget, MONEY),
        ("aim", policy.aim.value, TEXT),
        ("least gain (%)", policy.least_gain, PERCENT),
        ("relief given up for fewer moves (%)", policy.relief_given_up, PERCENT),
        ("tolerance on limits (%)", policy.tolerance, PERCENT),
        ("cured before", policy.cured_by or None, TIME),
        ("finished before", policy.finish_by or None, TIME),
        ("hold (days)", policy.hold_days, WHOLE),
        ("nights kept free (%)", policy.nights_kept_free, PERCENT),
        ("cutover (min)", policy.cutover_minutes, WHOLE),
        ("a cutover counts as (GiB)", policy.cutover_counts_as, GIBIBYTES),
        ("seed", policy.seed, WHOLE),
        ("time limit (s)", policy.time_limit, WHOLE),
    )
