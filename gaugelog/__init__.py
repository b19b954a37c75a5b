"""Gaugelog: plan strain-gauge installations, lead them, and keep signed records of them."""

__version__ = "0.1.0"
