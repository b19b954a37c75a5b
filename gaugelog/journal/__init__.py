"""How facts are kept: entries, chain, keys, append, read, check. Knows nothing of the trade."""
