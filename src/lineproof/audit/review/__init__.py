"""Marks, findings and sign-off of a review; merging; how they print."""
