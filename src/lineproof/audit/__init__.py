"""Checking another engineer's work: claims, origins, slips, what is missing, review, proof."""
