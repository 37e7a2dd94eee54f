"""Thermodynamic properties of ideal gases and of water: the integration core under every heat in the account."""
