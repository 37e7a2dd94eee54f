"""Published tables that the tests compare the program with, each with its source and units, and how to read them."""
