"""Formulas against published figures, integrators, dimensions and limits."""
