"""Trains: parts of a bench joined by named ports, checked before any light is sent."""

from fastaxis.train.routes import Leg, Route
from fastaxis.train.train import Train

__all__ = ["Leg", "Route", "Train"]
