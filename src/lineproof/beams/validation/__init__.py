"""Validation: predictions set against published values, each a recorded step with its source."""
