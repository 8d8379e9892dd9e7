"""Ratios of times, printed and never asserted: `python -m tests.benchmarks`."""
