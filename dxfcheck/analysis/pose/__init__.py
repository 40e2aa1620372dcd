"""How good the drawn pose is: dead centres, pushes, finite steps, trust."""
