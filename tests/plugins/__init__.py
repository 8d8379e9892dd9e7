"""Tests of plugins: found, loaded, kept apart."""
