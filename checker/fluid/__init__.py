"""State of the fluid in a line case: what the row itself gives, resolved to one flow and one density."""
