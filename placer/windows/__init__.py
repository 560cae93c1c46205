"""Dates to instants: recurrences, local clocks, windows with the freezes cut out."""
