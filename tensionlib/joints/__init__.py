"""End connections: what they are, their sketches."""
