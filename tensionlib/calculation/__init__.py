"""Formulas, sheets, and calculations with their readings."""
