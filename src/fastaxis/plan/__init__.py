"""From a train and a question to an ordered list of steps; only algebra, no physics of its own."""

from fastaxis.plan.grid import Grid
from fastaxis.plan.making import make_plan
from fastaxis.plan.plan import Branch, Plan
from fastaxis.plan.steps import JonesStep, Step

__all__ = ["Branch", "Grid", "JonesStep", "Plan", "Step", "make_plan"]
