"""Widgets for a notebook: choose, compare, sweep."""
