"""What stands there: joints, bars, supports, the forms, the restraint graph, the stiffness solution."""
