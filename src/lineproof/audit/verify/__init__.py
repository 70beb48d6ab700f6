"""A printed package against the record inside it."""
