"""What is flagged: rules as data and a small engine of three values."""
