"""The command line: a file a command group; wires the parts together."""
