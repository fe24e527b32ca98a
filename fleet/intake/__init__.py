"""Files in: sheets and CSV to typed rows, faults and doubts. What is on record comes as an argument."""
