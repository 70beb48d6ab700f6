"""A beam of any number of spans, from floor loads to bar schedule."""
