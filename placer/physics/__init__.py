"""Formulas of the machines: capacity, drives, protection, wear, waiting, controllers.

Knows records of the estate and arithmetic; knows no solver, no file and no plan.
"""
