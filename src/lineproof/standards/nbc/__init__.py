"""National Building Code: specified loads and load combinations."""
