"""The single slips that reproduce a claimed value, ranked."""
