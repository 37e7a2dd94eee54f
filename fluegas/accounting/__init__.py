"""The heat account: losses, credits and efficiency as one pure function of arrays, and the comparison of settings."""
