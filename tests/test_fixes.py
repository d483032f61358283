"""Fixes are pasted: in a script that imported fastaxis as fa and its units, and calls its bench train, they run."""

import ast
import warnings

import pytest
import sympy

import fastaxis as fa
from fastaxis import units

A = sympy.Symbol("a", real=True)
UNITS = {name: getattr(units, name) for name in units.__all__}


def bench():
    """Laser, plate, splitter, camera; a mirror lies on the table."""
    train = fa.Train(wavelength=532e-9, name="Low Quay").along(
        fa.Laser(waist=0.8e-3, power=5e-3, name="laser"),
        fa.HalfWavePlate(fast=0.3, name="hwp"),
        fa.PolarizingBeamSplitter(name="pbs"),
        fa.Camera(pixel=20e-6, shape=(64, 64), name="cam"),
    )
    return train.add(fa.Mirror(name="mirror"))


def line(*parts):
    laser = fa.Laser(waist=0.8e-3, power=5e-3, name="laser")
    return fa.Train(wavelength=532e-9).along(laser, *parts, fa.Camera(pixel=20e-6, shape=(64, 64), name="cam"))


SLIPS = [
    lambda: fa.Laser(waist=1e-3, state="H"),
    lambda: fa.Laser(waist=0.8),
    lambda: fa.Laser(mode="TEM00"),
    lambda: fa.Laser(beam="TEM00"),
    lambda: fa.Laser(incoherent=[0.5]),
    lambda: fa.Laser(mode=fa.Gaussian(1e-3), waist_at=0.2),
    lambda: fa.Laser(waist=1e-3, line="narrow"),
    lambda: fa.HalfWavePlate(angle=0),
    lambda: fa.Wedge(angle=0.1),
    lambda: fa.Lens(focus=0.5),
    lambda: fa.Laser(waste=1e-3),
    lambda: fa.Mask(phases=fa.Pattern),
    lambda: fa.BeamDump(size=2),
    lambda: fa.HalfWavePlate(fast=22.5),
    lambda: fa.QPlate(q=0.3),
    lambda: fa.Camera(pixel=3.45),
    lambda: fa.Grid(100000, 1e-3),
    lambda: fa.PatternedRetarder(),
    lambda: fa.PatternedRetarder(fast=lambda x, y: 1.0),
    lambda: fa.PatternedRetarder(fast=lambda x, y: x * float("nan")),
    lambda: fa.PatternedPolarizer(axis=lambda x, y: x + 1j),
    lambda: fa.Mask(transmission=lambda x, y: x),
    lambda: fa.State(0.1, 1.0),
    lambda: fa.State(0.1, 30),
    lambda: fa.elliptical(0.2, -1.2),
    lambda: fa.linear(45),
    lambda: fa.helicity(2),
    lambda: fa.from_jones(0, 0),
    lambda: fa.from_stokes(0, 0, 0),
    lambda: fa.from_stokes(0.3, 0, 0.4),
    lambda: fa.from_stokes(2, 0, 0),
    lambda: fa.StateMixture(((0.75, fa.H), (0.75, fa.linear(0.2)))),
    lambda: fa.StateMixture(()),
    lambda: fa.partially_polarized(fa.H, 2),
    lambda: fa.Term(1, fa.Gaussian(1e-3), "H"),
    lambda: fa.Term("half", fa.Gaussian(1e-3), fa.H),
    lambda: fa.Beam(()),
    lambda: fa.Beam((fa.Term(0, fa.Gaussian(1e-3), fa.H),)).power(5e-7),
    lambda: fa.make_source("H", fa.H, power=1),
    lambda: fa.Gaussian(waist=5),
    lambda: fa.LaguerreGauss(p=0.5, l=1, waist=1e-3),
    lambda: fa.SampledMode("x", pixel=1e-5),
    lambda: fa.SampledMode([[float("nan")] * 8] * 8, pixel=1e-5),
    lambda: fa.PlaneWave(area=0),
    lambda: fa.FlatTop(1e-3, order=1),
    lambda: fa.PlaneWave(4e-6).overlap(fa.PlaneWave(1e-6), 5e-7),
    lambda: fa.GaussianLine(),
    lambda: fa.GaussianLine(fwhm=2e-9),
    lambda: fa.HalfWavePlate(fast=0.1, temperature=25),
    lambda: fa.QPlate(q=0.5, drift=-100),
    lambda: fa.HalfWavePlate(fast=0.1, expects="H"),
    lambda: fa.Sensor(full_well=1e4, quantum_efficiency=62),
    lambda: fa.Camera(pixel=1e-5, sensor="fast"),
    lambda: fa.Camera(pixel=1e-5, exposure_time=0),
    lambda: fa.PhaseModulator(axis=0.1, phase=lambda x, y: x * float("nan")),
    lambda: fa.Comb(spacing=0, weights=(1,)),
    lambda: fa.Mount(45),
    lambda: fa.Mount(sense=2),
    lambda: fa.Mount(seen_from="left"),
    lambda: fa.polarizer_at(0, extinction=0.1),
    lambda: fa.plate_then_polarizer(),
    lambda: fa.Setting(""),
    lambda: fa.Setting("x", (fa.HalfWavePlate(fast=0.1).laws(1e-6)[0],), fa.H),
    lambda: fa.Setting("a", state=fa.State(A)).weights,
    lambda: fa.Grid(15, 1e-3),
    lambda: fa.Grid(16, 0),
    lambda: fa.Train(wavelength=532),
    # Questions to a bench
    lambda: bench().along("laser", 42),
    lambda: bench().along("laser", 0.1),
    lambda: bench().along(fa.Camera(pixel=1e-5, name="cam3"), fa.Lens(focal=1.0)),
    lambda: bench().join("bs", "cam"),
    lambda: bench().join("zzz", "cam"),
    lambda: bench().join("cam", "mirror"),
    lambda: bench().join("pbs.transmitted", "mirror"),
    lambda: bench().join("hwp.top", "mirror"),
    lambda: bench().add(fa.Lens(focal=1.0, name="a/b")),
    lambda: bench().add(fa.Lens(focal=1.0, name="hwp")),
    lambda: bench().with_changes([1]),
    lambda: bench().with_changes({"hwp.fats": 0.1}),
    lambda: bench().with_changes({"hpw": 0.1}),
    lambda: bench().with_values({"a": 1}),
    lambda: bench().route("mirror"),
    lambda: bench().expose("mirror", fa.H),
    lambda: bench().expose("cam", []),
    lambda: bench().expose("cam", "H"),
    lambda: bench().expose("cam", [3]),
    lambda: bench().expose("cam", fa.H, grid=5),
    lambda: bench().expose("cam", fa.H, engine="fast"),
    lambda: bench().expose("cam", fa.H, precision="half"),
    lambda: bench().expose("cam", fa.H).frame("X"),
    lambda: bench().expose("cam", fa.H).counts("H", exposure_time=1e-3),
    lambda: fa.Train.load("/nonexist/bench.json"),
    lambda: fa.Train.from_text(None),
    lambda: line(fa.Slit(width=20e-6)).expose("cam", fa.H, grid=fa.Grid(64, 6e-3)),
    lambda: line(fa.FreeSpace(1.0)).expose("cam", fa.H, grid=fa.Grid(64, 1e-3)),
    lambda: line(fa.QPlate(q=0.5)).expose("cam", fa.H, engine="uniform"),
    lambda: bench().set_sheet(mounts={"cam": fa.Mount()}),
]  # fmt: skip


def code_of(fix):
    """The fix as one expression: keyword arguments are put into a call."""
    for code in (fix, f"dict({fix})"):
        try:
            ast.parse(code, mode="eval")
        except SyntaxError:
            continue
        return code
    return fix


def pasted(slip, train):
    """What the fix of a slip gives, in a script that knows fa, the units, its train and its shots."""
    with warnings.catch_warnings():
        warnings.simplefilter("ignore", fa.FastaxisWarning)
        with pytest.raises(fa.FastaxisError) as refusal:
            slip()
        assert "\n" not in str(refusal.value)
        shots = bench().expose("cam", fa.SIX_STATES)
        return eval(code_of(refusal.value.fix), {"fa": fa, "train": train, "shots": shots, **UNITS})


@pytest.fixture(autouse=True)
def _in_an_empty_folder(tmp_path, monkeypatch):
    """A fix may write a file."""
    monkeypatch.chdir(tmp_path)


@pytest.mark.parametrize("slip", SLIPS, ids=range(len(SLIPS)))
def test_a_fix_runs_where_it_is_pasted(slip):
    answer = pasted(slip, bench())
    for function in (value for value in (answer.values() if isinstance(answer, dict) else ()) if callable(value)):
        assert function(units.mm, units.mm) is not None


def test_a_letter_without_a_value():
    train = line(fa.HalfWavePlate(fast=A))
    assert not pasted(lambda: train.expose("cam", fa.H), train).symbols


def test_a_train_without_a_laser():
    train = fa.Train(wavelength=532e-9).along(fa.Lens(focal=1.0, name="lens"), fa.Camera(pixel=1e-5, name="cam"))
    pasted(lambda: train.route("cam"), train).route("cam")


def test_an_ellipse_told_by_the_wrong_axis_is_the_same_ellipse():
    """60 deg of ellipticity is the ellipse of 30 deg with long and short axis exchanged."""
    ex, ey = 0.5, -1j * 3**0.5 / 2  # cos 60 deg, -i sin 60 deg
    answer = pasted(lambda: fa.State(0.0, 60 * units.deg), None)
    assert fa.State(**answer).stokes == pytest.approx(fa.from_jones(ex, ey).stokes, abs=1e-12)
