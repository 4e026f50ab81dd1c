"""What the program says: results as plain data, and each form they are written in."""
