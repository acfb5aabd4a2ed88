"""What a line number says: one key for comparison, the pattern of a list's numbers, and the parts of each number."""
