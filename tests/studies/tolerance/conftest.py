"""Benches with many knobs."""

import runpy

import pytest

import fastaxis as fa
from fastaxis.units import deg, mm, nm


@pytest.fixture(scope="session")
def teasel_bank(request):
    """The names of the example of a tolerance study."""
    return runpy.run_path(str(request.config.rootpath / "train_examples" / "teasel_bank_twelve_knobs.py"))


@pytest.fixture(scope="session")
def many(teasel_bank):
    """Twelve knobs on a centred train with a q-plate between uniform plates."""
    return teasel_bank["train"]


@pytest.fixture(scope="session")
def twelve(teasel_bank):
    return teasel_bank["errors"]


@pytest.fixture(scope="module")
def malus():
    """A polarizer behind H: the power is P cos^2(axis)."""
    return fa.Train(wavelength=633 * nm, name="Marram").along(
        fa.Laser(waist=1 * mm, power=1.0, state=fa.H, name="laser"),
        fa.Polarizer(axis=30 * deg, name="pol"),
        fa.Detector(name="meter"),
    )
