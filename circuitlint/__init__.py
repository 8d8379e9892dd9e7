"""circuitlint: holds text definitions of inductive circuits against published limits, before anything is installed."""

__version__ = "0.1.0"

__all__ = ["__version__"]
