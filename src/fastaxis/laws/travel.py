"""The travel law: a paraxial ABCD section and its optical path length."""

from __future__ import annotations

from dataclasses import dataclass

from fastaxis.maths import Scalar

__all__ = ["TravelLaw"]


@dataclass(frozen=True)
class TravelLaw:
    """Ray matrix ((a, b), (c, d)) acting on (height [m], angle [rad]), with a d - b c = 1.

    The envelope moves by the Collins integral of this matrix; the carrier exp(i k path) is kept apart
    as optical path length ``path`` [m], so that no rounding of k*z ever sets a relative phase.
    """

    a: Scalar = 1.0
    b: Scalar = 0.0
    c: Scalar = 0.0
    d: Scalar = 1.0
    path: Scalar = 0.0

    uniform = False

    @classmethod
    def free(cls, distance: Scalar) -> TravelLaw:
        """Free space of this length [m]."""
        return cls(1.0, distance, 0.0, 1.0, distance)

    @classmethod
    def lens(cls, vergence: Scalar) -> TravelLaw:
        """A thin centred lens of this vergence 1/f [1/m]."""
        return cls(1.0, 0.0, -vergence, 1.0, 0.0)

    @property
    def values(self) -> tuple[Scalar, ...]:
        return (self.a, self.b, self.c, self.d, self.path)

    def then(self, later: TravelLaw) -> TravelLaw:
        """This section followed by a later one, as one section."""
        return TravelLaw(
            later.a * self.a + later.b * self.c,
            later.a * self.b + later.b * self.d,
            later.c * self.a + later.d * self.c,
            later.c * self.b + later.d * self.d,
            self.path + later.path,
        )

    def mirrored(self, axis: str = "x") -> TravelLaw:
        """Travel knows no left and right."""
        return self

    def backward(self) -> TravelLaw:
        """The section met from behind: a and d change places."""
        return TravelLaw(self.d, self.b, self.c, self.a, self.path)
