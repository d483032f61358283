"""What a plan is made of: laws in order, each with the parts it came from."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any, TypeAlias

from fastaxis.laws import Law
from fastaxis.maths import NUMBERS, Maths
from fastaxis.plan.displacement import Displacement

__all__ = ["JonesStep", "Step", "StepLaw", "Steps"]

Row: TypeAlias = tuple[complex, complex]


@dataclass(frozen=True)
class JonesStep:
    """One complex 2x2 matrix on (Ex, Ey), the same everywhere: any run of uniform laws.

    Parameters
    ----------
    matrix : rows, ((xx, xy), (yx, yy)).
    """

    matrix: tuple[Row, Row] = ((1, 0), (0, 1))

    uniform = True
    values = ()

    @classmethod
    def of(cls, law: Any) -> JonesStep:
        """The matrix of a uniform law."""
        (a, b), (c, d) = law.linear(NUMBERS)
        return cls(((complex(a), complex(b)), (complex(c), complex(d))))

    @classmethod
    def scale(cls, amplitude: complex) -> JonesStep:
        """The same amplitude for both polarizations."""
        return cls(((amplitude, 0j), (0j, amplitude)))

    def then(self, later: JonesStep) -> JonesStep:
        """This matrix followed by a later one."""
        (a, b), (c, d) = self.matrix
        (e, f), (g, h) = later.matrix
        return JonesStep(((e * a + f * c, e * b + f * d), (g * a + h * c, g * b + h * d)))

    def linear(self, maths: Maths, phi: Any = 0.0, x: Any = 0.0, y: Any = 0.0) -> tuple[Row, Row]:
        """The matrix in the basis (x, y)."""
        return self.matrix


StepLaw: TypeAlias = Law | JonesStep | Displacement


@dataclass(frozen=True)
class Step:
    """One law and the names of the parts it came from."""

    names: tuple[str, ...]
    law: StepLaw

    def joined(self, other: Step, law: StepLaw) -> Step:
        """Two steps made one, in order, each part named once."""
        return Step(tuple(dict.fromkeys(self.names + other.names)), law)


Steps: TypeAlias = tuple[Step, ...]
