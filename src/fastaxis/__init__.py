"""fastaxis: declare an optical bench, predict every camera frame, derive the formula.

>>> import fastaxis as fa
>>> from fastaxis.units import nm, um, mm, mW, deg
>>> train = fa.Train(wavelength=532*nm, name="first light")
>>> _ = train.along(
...     fa.Laser(waist=0.80*mm, power=5*mW, state=fa.H, name="laser"),
...     fa.HalfWavePlate(fast=22.5*deg, name="hwp"),
...     fa.Camera(pixel=20*um, shape=(256, 256), name="cam"),
... )
>>> shots = train.expose("cam", fa.SIX_STATES)
>>> round(shots.power("D") / mW, 6)
5.0

Names load on first use, so importing the package stays light.
"""

from importlib import import_module

TYPE_CHECKING = False  # typing takes longer than all the rest here, and Ctrl-C is not caught before the command starts
if TYPE_CHECKING:
    from typing import Any

    from fastaxis.camera import (
        SIX_STATES,
        Exposure,
        Setting,
        four_frames,
        no_analyzer,
        plate_then_polarizer,
        polarizer_at,
        rotating_plate,
    )
    from fastaxis.conventions import View, stamp
    from fastaxis.elements import (
        Annulus,
        Aperture,
        BeamDump,
        BeamSplitter,
        Camera,
        Detector,
        DovePrism,
        FaradayRotator,
        FreeSpace,
        HalfWavePlate,
        KMirror,
        KnifeEdge,
        Laser,
        Lens,
        Mask,
        MetalMirror,
        Mirror,
        NeutralDensity,
        Obstacle,
        PatternedPolarizer,
        PatternedRetarder,
        PhaseModulator,
        PhaseShift,
        PickOff,
        Polarizer,
        PolarizingBeamSplitter,
        QPlate,
        QuarterWavePlate,
        RectangularAperture,
        Retarder,
        Rhomb,
        Rotator,
        Sensor,
        Slit,
        SpiralPlate,
        Wedge,
        Window,
    )
    from fastaxis.engines.memory import forget_light, remember_light
    from fastaxis.errors import (
        FastaxisError,
        FastaxisWarning,
        FileFormatError,
        MissingFileError,
        ParameterError,
        SamplingError,
        SamplingWarning,
        SlipWarning,
        SymbolError,
        WiringError,
        WiringWarning,
    )
    from fastaxis.inspect import Mount
    from fastaxis.light import (
        UNPOLARIZED,
        A,
        Beam,
        Comb,
        D,
        FlatTop,
        Gaussian,
        GaussianLine,
        H,
        HermiteGauss,
        L,
        LaguerreGauss,
        LorentzianLine,
        Monochromatic,
        PlaneWave,
        R,
        SampledMode,
        Source,
        State,
        StateMixture,
        Term,
        V,
        coherent_source,
        elliptical,
        from_jones,
        from_stokes,
        helicity,
        linear,
        make_source,
        partially_polarized,
    )
    from fastaxis.maths import Pattern
    from fastaxis.plan import Grid
    from fastaxis.train import Train

__version__ = "0.1.0"

_HOMES = {
    "camera": "SIX_STATES Exposure Setting four_frames no_analyzer plate_then_polarizer polarizer_at rotating_plate",
    "conventions": "View stamp",
    "elements": "Annulus Aperture BeamDump BeamSplitter Camera Detector DovePrism FaradayRotator FreeSpace "
    "HalfWavePlate KMirror KnifeEdge Laser Lens Mask MetalMirror Mirror NeutralDensity Obstacle PatternedPolarizer "
    "PatternedRetarder PhaseModulator PhaseShift PickOff Polarizer PolarizingBeamSplitter QPlate QuarterWavePlate "
    "RectangularAperture Retarder Rhomb Rotator Sensor Slit SpiralPlate Wedge Window",
    "engines.memory": "forget_light remember_light",
    "errors": "FastaxisError FastaxisWarning FileFormatError MissingFileError ParameterError SamplingError "
    "SamplingWarning SlipWarning SymbolError WiringError WiringWarning",
    "inspect": "Mount",
    "light": "UNPOLARIZED A Beam Comb D FlatTop Gaussian GaussianLine H HermiteGauss L LaguerreGauss LorentzianLine "
    "Monochromatic PlaneWave R SampledMode Source State StateMixture Term V coherent_source elliptical from_jones "
    "from_stokes helicity linear make_source partially_polarized",
    "maths": "Pattern",
    "plan": "Grid",
    "train": "Train",
}
_HOME = {name: home for home, names in _HOMES.items() for name in names.split()}

__all__ = sorted([*_HOME, "__version__"])  # noqa: PLE0605 - built from the table above


def __getattr__(name: str) -> "Any":
    if name not in _HOME:
        raise AttributeError(f"module 'fastaxis' has no attribute {name!r}")
    value = getattr(import_module(f"fastaxis.{_HOME[name]}"), name)
    globals()[name] = value
    return value


def __dir__() -> list[str]:
    return list(__all__)
