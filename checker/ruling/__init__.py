"""The rule contract, the catalogue of rules, and the run that gives every line case its outcomes."""
