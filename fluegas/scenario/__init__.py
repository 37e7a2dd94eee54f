"""Scenario files, format 1: inputs declared once, reading, checking, arrays for the account, the result."""
