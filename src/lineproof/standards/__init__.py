"""The catalogue: what the standards say, as formulas, tables and editions."""
