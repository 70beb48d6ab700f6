"""Searches of a record: drawing against calc, missing checks, traps."""
