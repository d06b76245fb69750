"""Speed as ratios to work that everybody knows: ``python -m tests.benchmarks``."""
