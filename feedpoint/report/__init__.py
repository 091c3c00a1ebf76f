"""What people and programs read: tables, summaries, files. Nothing here computes with impedances."""
