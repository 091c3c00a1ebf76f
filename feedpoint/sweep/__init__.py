"""Sweeps: the record, the readers of the file formats, and the checks that every sweep passes."""
