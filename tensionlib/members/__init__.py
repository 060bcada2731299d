"""A member with its ends, and the way from it to a calculation."""
