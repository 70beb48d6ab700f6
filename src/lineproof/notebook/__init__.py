"""Calc notebooks: parts under their cells, reading, executing, comparing, exporters."""
