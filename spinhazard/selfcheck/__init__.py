"""Published values recomputed by the program's own formulas, on the user's own installation."""
