"""The register: which code is judged by which rule, in the order of DEVELOPERS.md."""

from collections.abc import Callable, Iterator

from placer.audit import claims, copies, moves, placement, replay, trust
from placer.audit.case import Case
from placer.estate import RuleKind

Rule = Callable[[Case], Iterator[str]]

PLACEMENT: tuple[tuple[str, Rule], ...] = (
    ("one-place", placement.one_place),
    ("pool-room", placement.kept("pool-room")),
    ("pool-thin", placement.kept("pool-thin")),
    ("pool-busy", placement.kept("pool-busy")),
    ("pool-wear", placement.kept("pool-wear")),
    ("controller-busy", placement.kept("controller-busy")),
    ("array-volumes", placement.kept("array-volumes")),
    ("array-hosts", placement.kept("array-hosts")),
    ("largest-volume", placement.largest_volume),
    ("source-only", placement.source_only),
    ("host-reach", placement.host_reach),
    ("route", placement.route),
    ("only-on", placement.asked(RuleKind.ONLY_ON)),
    ("never-on", placement.asked(RuleKind.NEVER_ON)),
    ("apart", placement.asked(RuleKind.APART)),
    ("together", placement.asked(RuleKind.TOGETHER)),
    ("stays", placement.stays),
    ("budget", placement.budget),
    ("steps", placement.steps),
)
NIGHTS: tuple[tuple[str, Rule], ...] = (
    ("move-list", moves.move_list),
    ("window", copies.window),
    ("change-lead", copies.change_lead),
    ("finish-by", moves.finish_by),
    ("one-copy", copies.one_copy),
    ("array-out", copies.array_out),
    ("array-in", copies.array_in),
    ("route-together", copies.route_together),
    ("array-copies", copies.array_copies),
    ("window-copies", copies.window_copies),
    ("window-rate", copies.window_rate),
    ("copy-whole", moves.copy_whole),
    ("cutover-time", moves.cutover_time),
    ("cutover-together", moves.cutover_together),
    ("window-cutovers", moves.window_cutovers),
    ("hold", moves.hold),
    ("pool-room", replay.first_day("pool-room")),
    ("pool-thin", replay.first_day("pool-thin")),
    ("array-volumes", replay.first_day("array-volumes")),
    ("pool-busy", replay.first_day("pool-busy")),
    ("controller-busy", replay.first_day("controller-busy")),
    ("cured-by", replay.cured_by),
)
TRUST: tuple[tuple[str, Rule], ...] = (
    ("digest", trust.digest),
    ("control", trust.control),
    ("claim-goals", claims.goals),
    ("claim-bound", claims.bound),
    ("claim-uses", claims.uses),
    ("claim-responses", claims.responses),
    ("claim-reasons", claims.reasons),
)
CODES: tuple[str, ...] = tuple(dict.fromkeys(c for c, _ in PLACEMENT + NIGHTS + TRUST))
