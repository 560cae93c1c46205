"""Changes that reach a limit without breaking it, or lift it: nothing may be found."""

from corruptions.damage import (
    Pair,
    array,
    both,
    estate,
    goal,
    move,
    placed,
    policy,
    pool,
    route,
    stated,
    tenant,
    use,
    volume,
    window,
)
from corruptions.damaged_replay import lacking
from corruptions.harbour import at
from placer.estate import Control, Host, Rule, RuleKind
from placer.units import GIB, KB, MB, MILLI

CLEAN: dict[str, Pair] = {
    "money to the last hundredth": policy(budget=50_000),
    "a volume of the largest size": array("inland", largest_volume=300 * GIB),
    "a large volume that is copied inside its array": array(
        "new", largest_volume=200 * GIB
    ),
    "the first copy at the earliest instant": policy(earliest=at(3, 13, 22)),
    "the last cutover at the instant to finish by": policy(finish_by=at(3, 28, 1)),
    "no date to finish by": policy(finish_by=0),
    "no date of a cure": policy(cured_by=0),
    "cured as the hold of tickets ends": policy(cured_by=at(3, 27, 22)),
    "cured an hour late where the plan says so": lacking("old/spin"),
    "a window that names both arrays": window("second", arrays=("old", "inland")),
    "any number of cutovers": window("first", cutovers=0),
    "any number of copies": window("first", at_once=0),
    "any rate in a window": window("first", rate=0),
    "any rate of one copy": array("old", one_copy=0),
    "any number of copies of an array": array("old", copies_at_once=0),
    "any rate out of an array": array("old", copies_out=0),
    "any rate over a route": route("old", "new", together=0),
    "the route's rate": route("harbour", "inland", one_copy=50 * MB),
    "a host not listed reaches all": estate(hosts=()),
    "no routes at all": estate(routes=()),
    "a host listed without arrays": estate(hosts=(Host(name="quay"),)),
    "a rule without volumes": estate(rules=(Rule(kind=RuleKind.APART, volumes=()),)),
    "nothing typed": estate(controls=(Control("", None, None, None),)),
    "0.4 % more typed": estate(controls=(Control("", None, 2_268 * GIB, None),)),
    "0.7 % off a response": placed("old/tickets-1", response_today=12_900),
    "1 µs off a response": placed("new/logs", response_today=207),
    "0.00001 % off a use": use("old/spin", "pool-busy", "planned", use=24.000_002),
    "a gap of 0.009 %": goal("effort", bound=769.931),
    "4 % of relief spent": goal("relief", reached=16_368.0, bound=16_368.0),
    "volumes that stay where their host would not reach": estate(
        hosts=(Host(name="office", arrays=("old",)),)
    ),
    "a cutover that ends with its window": move("m5", cutover=at(3, 28, 5)),
    "room to the last byte of the snapshots": both(
        pool("berth/flash", fill_ceiling=360_000),
        stated("berth/flash", "pool-room", 180),
    ),
    "drives as busy as they may be": both(
        pool("mole/disks", busy_ceiling=13_920),
        stated("mole/disks", "pool-busy", 1.392),
    ),
    "controllers as busy as they may be": both(
        array("mole", controller_ceiling=16_000),
        stated("mole", "controller-busy", 1.6),
    ),
    "a hold as long as snapshots are kept": volume("mole/songs", hold_days=21),
    "a hold longer than snapshots are kept": volume(
        "mole/songs", hold_days=21, snapshot_days=20
    ),
    "snapshots kept for a fortnight": volume("old/mail", snapshot_days=14),
    "snapshots of a volume that stays": volume("new/books", snapshot_days=90),
    "a tenant that asks for what it may": tenant(
        "old/mail", requests_cap=50 * MILLI, rate_cap=500 * KB
    ),
    "a plan for caps that are reached": tenant(
        "old/mail", requests_cap=50 * MILLI, rate_cap=500 * KB, plan_for_cap=True
    ),
    "a tenant that asks for less": tenant("old/mail", requests_cap=51 * MILLI),
    "a plan for the tighter cap": tenant(
        "old/mail", requests_cap=99 * MILLI, rate_cap=500 * KB, plan_for_cap=True
    ),
    "a plan for caps that are not": tenant("old/mail", plan_for_cap=True),
    "a volume that only writes hits nothing": volume(
        "inland/backup", read_hits=1_000_000
    ),
    "a cache that divides into no other": array("new", cache=123_456_789_013),
    "flash fetches no units": pool("berth/flash", prefetch_unit=0),
    "no unit where all reads are random": pool("old/spin", prefetch_unit=0),
    "sequential reads of flash": volume("berth/manifests", random_reads=0),
    "drives measured busier": pool("mole/disks", busy_measured=900_000),
    "controllers measured busier": array("mole", busy_measured=900_000),
}
