"""What a schedule hands on."""

from dataclasses import dataclass

from placer.plan import Booking, Left, Move, Shortage


@dataclass(frozen=True, slots=True)
class Schedule:
    """Moves with clock times, the pieces of their copies, and what found no night.

    Attributes
    ----------
    moves
        In the order of their starts.
    bookings
        In the order of their starts.
    left
        In the order in which the moves were to be tried.
    overruns
        Limits that are not yet kept on the date of the cure.
    """

    moves: tuple[Move, ...] = ()
    bookings: tuple[Booking, ...] = ()
    left: tuple[Left, ...] = ()
    overruns: tuple[Shortage, ...] = ()
