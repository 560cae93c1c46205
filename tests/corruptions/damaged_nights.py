"""Damages that rules of the nights must find."""

from dataclasses import replace

from corruptions.damage import (
    array,
    booking,
    bookings,
    both,
    damage,
    move,
    moves,
    plan,
    policy,
    route,
    volume,
    window,
)
from corruptions.harbour import at
from corruptions.sailing import PLAN
from placer.plan import Left, Move
from placer.units import GIB, MB

USES = "claim-uses"
BACKUP = Move(
    id="m7",
    volume="inland/backup",
    source="inland/box",
    target="inland/box",
    size=500 * GIB,
    starts=at(3, 27, 23),
    ends=at(3, 27, 23),
    window="third-b",
    cutover=at(3, 28, 1),
    released=at(4, 10, 22),
)
RELICS_LEFT = Left("old/relics", "old/attic", "inland/box", "a night")
SECOND_NIGHT = {
    "starts": at(3, 20, 23, 48),
    "ends": at(3, 21, 0, 6),
    "window": "second",
}
LATE = {"starts": at(3, 13, 22, 18), "ends": at(3, 13, 22, 54)}

DAMAGES = (
    damage("move-list", "a move is missing", plan(moves=PLAN.moves[:-1])),
    damage(
        "move-list",
        "a move of one that stays",
        plan(moves=(*PLAN.moves, BACKUP)),
        "copy-whole",
    ),
    damage(
        "move-list",
        "moved and left over",
        plan(left=(RELICS_LEFT,)),
        "cutover-together",
    ),
    damage(
        "move-list",
        "another target",
        move("m3", target="old/spin"),
        "pool-room",
    ),
    damage("move-list", "a byte count of the day before", move("m4", size=299 * GIB)),
    damage(
        "move-list",
        "left over for another target",
        plan(
            moves=tuple(m for m in PLAN.moves if m.id != "m5"),
            bookings=tuple(b for b in PLAN.bookings if b.move != "m5"),
            left=(replace(RELICS_LEFT, target="old/spin"),),
        ),
    ),
    damage(
        "move-list",
        "left over where it is to stay",
        plan(left=(Left("new/books", "new/spin", "new/spin", "a night"),)),
    ),
    damage(
        "move-list",
        "two of one name",
        move("m3", id="m2"),
        "copy-whole",
    ),
    damage("move-list", "to no pool", move("m5", target="inland/loft")),
    damage("move-list", "of no volume", move("m5", volume="old/anchors")),
    damage("move-list", "a booking of no move", booking(5, move="m9"), "copy-whole"),
    damage("move-list", "a booking in no window", booking(5, window="never")),
    damage(
        "window",
        "the copy outlasts the window",
        window("first", end=at(3, 13, 22, 30)),
        "cutover-time",
    ),
    damage("window", "booked in the wrong night", booking(5, window="second")),
    damage(
        "window",
        "not open to the new array",
        window("first", arrays=("old",)),
        "cutover-time",
    ),
    damage(
        "change-lead", "two copies a minute early", policy(earliest=at(3, 13, 22, 1))
    ),
    damage("change-lead", "all but one too early", policy(earliest=at(3, 27))),
    damage("finish-by", "due before the last night", policy(finish_by=at(3, 28))),
    damage("finish-by", "due a minute earlier", policy(finish_by=at(3, 28, 0, 59))),
    damage("one-copy", "faster than the source", array("old", one_copy=99 * MB)),
    damage("one-copy", "faster than the target", array("inland", one_copy=49 * MB)),
    damage("one-copy", "faster than the route", route("old", "new", one_copy=60 * MB)),
    damage(
        "one-copy",
        "two pieces overlap",
        both(
            array("inland", copies_at_once=2, copies_in=100 * MB),
            plan(bookings=bookings({4: {"starts": at(3, 20, 22, 59)}})),
        ),
        "route-together",
    ),
    damage("one-copy", "at no rate", booking(5, rate=0), "copy-whole"),
    damage("array-out", "149 MB/s out of old", array("old", copies_out=149 * MB)),
    damage("array-out", "99 MB/s inside new", array("new", copies_out=99 * MB)),
    damage("array-in", "149 MB/s into new", array("new", copies_in=149 * MB)),
    damage("array-in", "49 MB/s into inland", array("inland", copies_in=49 * MB)),
    damage("route-together", "two share 149", route("old", "new", together=149 * MB)),
    damage(
        "route-together",
        "one has 49",
        route("harbour", "inland", together=49 * MB),
    ),
    damage("array-copies", "old runs two", array("old", copies_at_once=1)),
    damage(
        "array-copies",
        "new runs two with the copy inside it",
        both(
            array("new", copies_at_once=1),
            plan(
                moves=moves(
                    {
                        "m2": LATE,
                        "m3": {"starts": at(3, 13, 22, 54), "ends": at(3, 13, 23)},
                    }
                ),
                bookings=bookings(
                    {1: LATE, 2: {"starts": at(3, 13, 22, 53), "ends": at(3, 13, 23)}}
                ),
            ),
        ),
        "copy-whole",
    ),
    damage("window-copies", "one at once", window("first", at_once=1)),
    damage(
        "window-copies",
        "three run, two at once",
        both(
            array("new", copies_at_once=3),
            plan(
                moves=moves(
                    {"m3": {"starts": at(3, 13, 22, 7), "ends": at(3, 13, 22, 18)}}
                ),
                bookings=bookings(
                    {2: {"starts": at(3, 13, 22, 7), "ends": at(3, 13, 22, 18)}}
                ),
            ),
        ),
    ),
    damage("window-rate", "149 MB/s of 150", window("first", rate=149 * MB)),
    damage("window-rate", "49 MB/s of 50", window("third-a", rate=49 * MB)),
    damage("copy-whole", "a piece too slow", booking(0, rate=90 * MB)),
    damage("copy-whole", "a piece is missing", plan(bookings=PLAN.bookings[:-1])),
    damage("copy-whole", "said to end early", move("m4", ends=at(3, 20, 23))),
    damage("copy-whole", "said to start late", move("m5", starts=at(3, 27, 22, 1))),
    damage(
        "cutover-time", "before the copy ends", move("m3", cutover=at(3, 13, 22, 40))
    ),
    damage("cutover-time", "no hour left", move("m5", cutover=at(3, 28, 5, 1))),
    damage("cutover-time", "in a freeze", move("m5", cutover=at(3, 28, 0, 30))),
    damage("cutover-together", "an hour apart", move("m2", cutover=at(3, 14, 0))),
    damage(
        "cutover-together",
        "one of an application is left over",
        plan(
            moves=PLAN.moves[1:],
            bookings=PLAN.bookings[1:],
            left=(Left("old/tickets-1", "old/spin", "new/flash", "10 MB/s"),),
        ),
    ),
    damage(
        "cutover-together",
        "tickets and logs share an application",
        both(
            volume("new/logs", applications=("tickets", "audit trail")),
            move("m3", cutover=at(3, 13, 23, 30)),
        ),
    ),
    damage("window-cutovers", "two of one", window("first", cutovers=1)),
    damage(
        "window-cutovers",
        "a second cutover on the second night",
        plan(
            moves=moves(
                {
                    "m5": SECOND_NIGHT
                    | {"cutover": at(3, 21, 0, 6), "released": at(4, 3, 22)}
                }
            ),
            bookings=bookings({5: SECOND_NIGHT}),
        ),
    ),
    damage("hold", "until no calendar ends", move("m4", released=10**12)),
    damage("hold", "an hour short over summer time", move("m4", released=at(4, 3, 21))),
    damage("hold", "counted from the cutover", move("m1", released=at(3, 27, 23))),
    damage("hold", "a month is kept", volume("old/relics", hold_days=30)),
)
