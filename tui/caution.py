"""The caution that stands on every screen with a computed number."""

CAUTION = "An estimate: local rules, the technical manual and licensed riggers go first."
"""Of a width that fits 80 columns on one line."""
