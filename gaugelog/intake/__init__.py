"""People's files (TOML, CSV) into facts, or into a list of every fault with its where."""
