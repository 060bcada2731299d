"""The version of the library."""

__version__ = "0.1.0"
