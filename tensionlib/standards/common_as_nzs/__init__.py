"""What AS 4100 and NZS 3404 say alike: formulas in clause order and the walk of a member."""
