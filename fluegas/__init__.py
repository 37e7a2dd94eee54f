"""Heat accounts of fired units: from a fuel analysis and flue-gas readings to losses, credits and efficiency."""

__version__ = "0.1.0"
