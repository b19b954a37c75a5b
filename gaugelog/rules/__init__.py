"""What is acceptable: limits, verdicts, fitting lots, who may sign. Reads, never writes."""
