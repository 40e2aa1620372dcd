"""The order in which the rules are applied to the linework, up to bodies and their joints."""
