"""Exposures of several sensors at once."""

import numpy as np

import pytest

import fastaxis as fa
from fastaxis.engines.sharing import Prefix
from fastaxis.units import deg, mm, nm, um

# Samples set by hand on purpose coarser than edges and vortices want; that they are is said, and tested elsewhere.
coarse = pytest.mark.filterwarnings("ignore::fastaxis.errors.SamplingWarning")


def bench():
    train = fa.Train(wavelength=532 * nm, name="Gannet Stack").along(
        fa.Laser(waist=0.5 * mm, state=fa.D),
        fa.QPlate(q=1, centre=(0.1 * mm, 0.0)),
        fa.FreeSpace(100 * mm),
        fa.QPlate(q=0.5, centre=(0.0, 0.1 * mm)),
        fa.PolarizingBeamSplitter(name="pbs"),
        fa.FreeSpace(80 * mm),
        fa.Camera(pixel=10 * um, shape=(40, 50), name="near"),
    )
    return train.along("pbs.reflected", fa.FreeSpace(150 * mm), fa.Camera(pixel=20 * um, shape=(30, 30), name="far"))


@coarse
def test_several_sensors_get_what_each_gets_alone(monkeypatch):
    train, grid = bench(), fa.Grid(samples=256, window=6 * mm)
    kept, of = [], Prefix.of.__func__
    monkeypatch.setattr(Prefix, "of", classmethod(lambda cls, *a: kept.append(a[1]) or of(cls, *a)))
    both = train.expose(["near", "far"], [fa.H, fa.linear(30 * deg)], grid=grid)
    assert kept and kept[0] >= 3  # plates and the space before the splitter
    for name, shots in zip(("near", "far"), both, strict=True):
        alone = train.expose(name, [fa.H, fa.linear(30 * deg)], grid=grid)
        assert shots.target == name
        assert np.array_equal(shots.frames, alone.frames)
