"""Readings of a calculation: plain data, text, LaTeX, HTML, and the notebook's bundle."""
