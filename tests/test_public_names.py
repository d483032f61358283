"""The names users type: all there, all light to import."""

import subprocess
import sys

import pytest

import fastaxis as fa


@pytest.mark.parametrize("name", fa.__all__)
def test_each_public_name_loads(name):
    assert getattr(fa, name) is not None
    assert name in dir(fa)


def test_an_unknown_name_is_an_attribute_error():
    with pytest.raises(AttributeError, match="no attribute 'Telescope'"):
        fa.Telescope


def test_declaring_a_bench_loads_no_heavy_library():
    code = (
        "import sys, fastaxis as fa\n"
        "fa.Train(wavelength=532e-9).along(fa.Laser(waist=1e-3), fa.HalfWavePlate(fast=0), fa.Detector())\n"
        "print([m for m in ('sympy', 'matplotlib', 'networkx', 'scipy.optimize', 'rich') if m in sys.modules])"
    )
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert done.stdout.strip() == "[]"
