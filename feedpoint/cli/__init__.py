"""The command line: options, one call, one show. Nothing here computes; numpy waits until work begins."""
