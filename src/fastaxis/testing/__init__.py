"""Assertions about a bench in lab terms, for a pytest file that stands beside it.

>>> import fastaxis as fa
>>> import fastaxis.testing as ft
>>> from fastaxis.units import deg, mm, mW, nm
>>> train = fa.Train(wavelength=633*nm, name="Saltpan").along(
...     fa.Laser(waist=1*mm, power=2*mW, state=fa.H, name="laser"),
...     fa.HalfWavePlate(fast=40*deg, name="hwp"), fa.Polarizer(axis=0*deg, name="pol"))
>>> ft.port_power(train, "laser", 2*mW)
>>> ft.port_dark(train, "pol", db=40)
Traceback (most recent call last):
...
fastaxis.testing.failing.BenchError: Saltpan: pol
  expected: dark to 40 dB below the laser
  got: 60.3 uW, 15.2 dB below the laser
  likely cause: hwp.fast stands at 45 deg, +5 deg off; or pol.axis stands at -10 deg, -10 deg off
"""

from importlib import import_module
from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from fastaxis.testing.energy import energy_closes
    from fastaxis.testing.failing import BenchError
    from fastaxis.testing.field import field_equal
    from fastaxis.testing.form import form_equal
    from fastaxis.testing.frame import frame_matches
    from fastaxis.testing.fringes import visibility
    from fastaxis.testing.inspection import passes_inspection
    from fastaxis.testing.lobes import lobe_angle, lobe_count, turning
    from fastaxis.testing.ports import port_dark, port_power
    from fastaxis.testing.ring import ring_radius
    from fastaxis.testing.singular import singular_index
    from fastaxis.testing.state import state_at
    from fastaxis.testing.vortex import charge

# Loaded on first use: the plugin of this room is loaded at every start of pytest.
_HOMES = {
    "vortex": "charge",
    "energy": "energy_closes",
    "failing": "BenchError",
    "field": "field_equal",
    "form": "form_equal",
    "frame": "frame_matches",
    "inspection": "passes_inspection",
    "lobes": "lobe_angle lobe_count turning",
    "ports": "port_dark port_power",
    "ring": "ring_radius",
    "singular": "singular_index",
    "state": "state_at",
    "fringes": "visibility",
}
_HOME = {name: home for home, names in _HOMES.items() for name in names.split()}

__all__ = sorted(_HOME)  # noqa: PLE0605 - built from the table above


def __dir__() -> list[str]:
    return list(__all__)


def __getattr__(name: str) -> Any:
    if name not in _HOME:
        raise AttributeError(f"module 'fastaxis.testing' has no attribute '{name}'")
    found = getattr(import_module(f"fastaxis.testing.{_HOME[name]}"), name)
    globals()[name] = found
    return found
