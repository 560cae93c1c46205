"""From a placement to moves, in the order in which the nights should try them."""

from placer.moves.transfers import transfers

__all__ = ["transfers"]
