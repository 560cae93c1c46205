"""Moves to nights: which copy runs when and at what rate, and when each cuts over."""

from placer.schedule.book import book
from placer.schedule.result import Schedule

__all__ = ["Schedule", "book"]
