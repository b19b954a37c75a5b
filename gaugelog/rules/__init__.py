"""What is acceptable: limits, verdicts, fitting lots, conflicts, who may sign. Reads, never writes."""
