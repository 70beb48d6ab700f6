"""Another engineer's notebook or record, read without running any of it."""
