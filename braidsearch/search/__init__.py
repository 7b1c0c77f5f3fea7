"""The search: limits, simplification, the meeting of two sides, and the driver of a query."""
