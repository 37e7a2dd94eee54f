"""Combustion per kilogram of fuel as fired: fuel, air, the product gas they give, flame temperature, dew points."""
