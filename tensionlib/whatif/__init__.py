"""Alternatives on arrays, solving, sensitivity, as built, few standard details."""
