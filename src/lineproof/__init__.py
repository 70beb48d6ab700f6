"""A calculation package in which every line can be proved."""
