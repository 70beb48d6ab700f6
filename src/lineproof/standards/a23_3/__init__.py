"""CSA A23.3: notation, formulas, criteria and tables, a module per clause group."""
