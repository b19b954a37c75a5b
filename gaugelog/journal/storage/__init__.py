"""Where entries are kept: a port that inserts and selects, and what stands behind it."""
