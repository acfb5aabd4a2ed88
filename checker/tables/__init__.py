"""Tables of published values, CSV, beside their reader."""
