"""Runs: the sections between the shack end and the feed point, the sheet that describes them, and the catalogue."""
