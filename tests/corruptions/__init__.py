"""Damaged plans: every rule of the audit must find what it is there for."""
