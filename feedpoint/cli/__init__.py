"""The command line: options, one call, one show. Nothing here computes; numpy waits until work begins."""

import gc

# A command makes little garbage and lives for a fraction of a second; looking for cycles while modules are imported
# takes 5 % of that. Here, because this runs before everything else that a command imports.
gc.set_threshold(100_000)
