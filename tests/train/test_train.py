"""The train as a user meets it: declaring, joining, copies, cameras, open ports."""

import subprocess
import sys
import warnings

import pytest

import fastaxis as fa
from fastaxis.units import deg, mm, nm


def test_along_joins_each_exit_to_the_next_entry(line):
    assert list(line.elements) == ["laser", "hwp", "lens", "cam"]
    assert line.joints == (("laser.out", "hwp.front"), ("hwp.back", "lens.front"), ("lens.back", "cam.in"))


def test_add_and_join_make_the_same_bench_as_along(line):
    other = fa.Train(wavelength=line.wavelength, name=line.name)
    for part in line.elements.values():
        assert other.add(part) is other
    for out_port, in_port in line.joints:
        assert other.join(out_port, in_port) is other
    assert other.to_text() == line.to_text()


def test_parts_without_a_name_get_stem_and_number():
    gap = fa.FreeSpace(distance=100 * mm)
    train = fa.Train(wavelength=532 * nm).along(gap, fa.Lens(focal=1.0, name="lens1"), gap, fa.Lens(focal=1.0))
    assert list(train.elements) == ["space1", "lens1", "space2", "lens2"]
    assert [part.name for part in train.elements.values()] == list(train.elements)


def test_a_refused_path_changes_nothing(line):
    before = line.to_text()
    with pytest.raises(fa.WiringError):
        line.along("hwp.back", fa.Polarizer(axis=0.0, name="pol"), "lens")
    assert line.to_text() == before


def test_a_copy_is_extended_on_its_own(line):
    copy = line.copy()
    copy.add(fa.BeamDump(name="dump"))
    assert "dump" not in line.elements
    assert copy.name == line.name
    assert copy.joints == line.joints


def test_with_changes_leaves_the_original(line):
    changed = line.with_changes({"hwp.fast": 3 * deg, "wavelength": 633 * nm, "lens.centre_x": 1 * mm})
    assert (changed.elements["hwp"].fast, changed.wavelength) == (3 * deg, 633 * nm)
    assert changed.elements["lens"].centre == (1 * mm, 0.0)
    assert (line.elements["hwp"].fast, line.wavelength) == (10 * deg, 532 * nm)
    assert changed.joints == line.joints


def test_a_changed_value_is_checked_like_a_declared_one(line):
    with pytest.raises(fa.ParameterError, match=r"hwp: fast = 45\.0; fast is in radians"):
        line.with_changes({"hwp.fast": 45})


def test_wavelength_without_its_unit_is_refused():
    with pytest.raises(fa.ParameterError, match="wavelength is in metres") as caught:
        fa.Train(wavelength=532)
    assert caught.value.fix == "wavelength=532*nm"


def test_cameras_and_sources(isolator):
    isolator.along("pbs.reflected", fa.Detector(name="meter"))
    assert isolator.cameras == ["cam"]
    assert isolator.sources == ["laser"]


def test_open_ports_are_lit_ports_joined_to_nothing(fork):
    assert fork.open_ports() == ["bs2.reflected"]
    assert "bs2.reflected" in fork.lit
    fork.along("bs2.reflected", fa.BeamDump())
    assert fork.open_ports() == []


def test_a_dark_port_is_not_open(line):
    line.along("lens.front", fa.BeamDump(name="dump"))
    assert line.open_ports() == []
    assert "dump.in" not in line.lit


def test_a_warning_is_given_once_and_not_again_by_copies(line):
    line.add(fa.Mirror(name="spare"))
    with pytest.warns(fa.WiringWarning, match="spare"):
        line.validate()
    with warnings.catch_warnings():
        warnings.simplefilter("error")
        line.validate()
        line.with_changes({"hwp.fast": 1 * deg}).route("cam")


def test_declaring_a_train_loads_neither_graphs_nor_algebra():
    code = (
        "import sys, fastaxis as fa; fa.Train(wavelength=5e-7).along(fa.Laser(waist=1e-3), fa.Lens(focal=1.0)); "
        "print([m for m in ('networkx', 'sympy', 'matplotlib') if m in sys.modules])"
    )
    shown = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert shown.stdout.strip() == "[]"
