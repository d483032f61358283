"""The one sign set, stated once, and the stamp that every result carries.

Time runs as exp(-i w t), a beam is looked at from its receiver, angles grow counter-clockwise from x,
and R turns clockwise in that view. Only the *naming* of the two circular states (and with it the sign
of S3) can be switched, as a whole, with a :class:`View`; the physics never changes.
"""

from enum import Enum

__all__ = ["View", "stamp"]


class View(Enum):
    """From where circular light is named.

    RECEIVER: R turns clockwise for an observer who faces the source (Hecht; Born & Wolf).
    SOURCE: R turns clockwise seen from behind the source, i.e. has positive helicity (IEEE, IAU).
    Under either naming S3 = I_R - I_L.
    """

    RECEIVER = "receiver"
    SOURCE = "source"

    @property
    def s3_sign(self) -> int:
        """Factor that takes S3 of the receiver's view to this view."""
        return 1 if self is View.RECEIVER else -1

    def circular_name(self, helicity: int) -> str:
        """'R' or 'L' for the state of this helicity (+1 or -1).

        >>> View.RECEIVER.circular_name(+1), View.SOURCE.circular_name(+1)
        ('L', 'R')
        """
        return "R" if helicity * self.s3_sign < 0 else "L"

    def rename(self, label: str) -> str:
        """A setting's label as named in the receiver's view, renamed for this view."""
        return {"R": "L", "L": "R"}.get(label, label) if self is View.SOURCE else label


def stamp(view: View = View.RECEIVER) -> str:
    """One line that says under which signs a result was made.

    >>> print(stamp())
    signs: exp(-iwt); seen facing the source, x right, y up; angles ccw; R = (1,-i)/√2 clockwise, \
helicity -1; S3 = I_R - I_L; fast axis exp(-iδ/2); array rows along +y
    """
    sign, turns = ("-", "clockwise") if view is View.RECEIVER else ("+", "counter-clockwise")
    return (
        "signs: exp(-iwt); seen facing the source, x right, y up; angles ccw; "
        f"R = (1,{sign}i)/√2 {turns}, helicity {sign}1; "
        "S3 = I_R - I_L; fast axis exp(-iδ/2); array rows along +y"
    )
