"""From a result to what people and programs read: tables, text, CSV and JSON."""
