"""Places volumes on flash and spinning pools, and plans the nights to get there."""

from importlib.metadata import version

__version__ = version("placer")
