"""Wiring mistakes: each gives one sentence with the rule, what was found, and code that can be pasted."""

from dataclasses import dataclass
from typing import Any

import pytest

import fastaxis as fa
from fastaxis.train import Train
from fastaxis.units import deg, mm, mW, nm, um

NAMES = {
    **{name: getattr(fa, name) for name in fa.__all__},
    "fa": fa,
    "deg": deg,
    "mm": mm,
    "mW": mW,
    "nm": nm,
    "um": um,
}


def bench() -> Train:
    """Laser, plate, splitter, camera; a second camera, a mirror and a dump lie on the table."""
    train = fa.Train(wavelength=532 * nm, name="bench").along(
        fa.Laser(waist=0.8 * mm, name="laser"),
        fa.HalfWavePlate(fast=22.5 * deg, name="hwp"),
        fa.PolarizingBeamSplitter(name="pbs"),
        fa.Camera(pixel=3.45 * um, name="cam"),
    )
    for part in (fa.Mirror(name="mirror"), fa.QuarterWavePlate(fast=45 * deg, name="qwp"), fa.BeamDump(name="dump")):
        train.add(part)
    return train.add(fa.Camera(pixel=3.45 * um, name="cam2"))


@dataclass
class Mistake:
    code: str
    says: str
    fix: str
    kind: type = fa.WiringError
    train: Any = bench

    @property
    def id(self) -> str:
        return self.code


def empty() -> Train:
    return fa.Train(wavelength=532 * nm, name="bench")


def dark() -> Train:
    return empty().along(fa.Lens(focal=1.0, name="lens"), fa.Camera(pixel=3.45 * um, name="cam"))


def complete() -> Train:
    return empty().along(fa.Laser(waist=1 * mm, name="laser"), fa.Camera(pixel=3.45 * um, name="cam"))


def ring() -> Train:
    """A splitter lets light into a ring of two mirrors that ends at the splitter again."""
    train = empty().along(fa.Laser(waist=1 * mm, name="laser"), fa.BeamSplitter(name="bs"), fa.Mirror(name="m1"))
    return train.along("m1", fa.Mirror(name="m2"), "bs.side")


def full() -> Train:
    """Light of one splitter meets again in another, and every port that it leaves by is taken."""
    train = empty().along(fa.Laser(waist=1 * mm, name="laser"), fa.BeamSplitter(name="bs1"), fa.Mirror(name="m1"))
    train.along("m1", fa.BeamSplitter(name="bs2"), fa.Detector(name="d1"))
    return train.along("bs1.reflected", fa.Mirror(name="m2"), "bs2.side").along("bs2.reflected", fa.Detector(name="d2"))


MISTAKES = [
    # Names
    Mistake('train.join("lazer", "cam2")', "'lazer': no part of this name; the train has the parts laser, hwp", '"laser"'),
    Mistake('train.join("pbs.reflected", "kam2")', "'kam2': no part of this name", '"cam2"'),
    Mistake('train.join("PBS.reflected", "cam2")', "'PBS': no part of this name", '"pbs"'),
    Mistake('train.route("camm")', "'camm': no part of this name", '"cam"'),
    Mistake('train.along("pbs.reflected", "qwpp", "cam2")', "'qwpp': no part of this name", '"qwp"'),
    Mistake('train.join("laser", "cam")', "'laser': no part of this name; the train has no parts yet",
            'train.add(fa.FreeSpace(100*mm, name="laser"))', train=empty),
    # Faces
    Mistake('train.join("pbs.reflect", "cam2")', "pbs.reflect: no face 'reflect'; PolarizingBeamSplitter has the faces front, "
            "transmitted, reflected, side", '"pbs.reflected"'),
    Mistake('train.join("pbs.reflected", "mirror.back")', "mirror.back: no face 'back'; Mirror has the faces front", '"mirror.front"'),
    Mistake('train.route("hwp.bak")', "hwp.bak: no face 'bak'", '"hwp.back"'),
    # Directions
    Mistake('train.join("cam2", "pbs.reflected")', "cam2 (Camera); light cannot leave there", 'train.join("pbs.reflected", "cam2.in")'),
    Mistake('train.join("pbs.reflected", "laser")', "laser (Laser); light cannot enter there", 'train.join("pbs.reflected", "cam2.in")'),
    Mistake('train.join("dump", "cam2")', "dump (BeamDump); light cannot leave there", 'train.join("pbs.reflected", "cam2.in")'),
    Mistake('train.join("cam2.in", "dump")', "cam2.in (Camera); light cannot leave there", 'train.join("pbs.reflected", "dump.in")'),
    Mistake('train.along("pbs.reflected", "cam2", "dump")', "cam2 (Camera); light cannot leave there", 'train.join("qwp.back", "dump.in")'),
    # Ports used twice
    Mistake('train.join("laser", "cam2")', "laser.out: already joined to hwp.front; light leaving a port goes to one place, and pbs.reflected is free",
            'train.join("pbs.reflected", "cam2.in")'),
    Mistake('train.join("mirror", "cam")', "cam.in: already fed by pbs.transmitted; a port is fed by one beam",
            'train.join("mirror.front", "cam2.in")'),
    Mistake('train.along("pbs.reflected", "hwp", "cam2")', "hwp.front: already fed by laser.out", 'train.join("pbs.reflected", "cam2.in")'),
    Mistake('train.join("pbs.transmitted", "cam2")', "pbs.transmitted: already joined to cam.in; light leaving a port goes to one "
            "place, and pbs.reflected is free", 'train.join("pbs.reflected", "cam2.in")'),
    Mistake('train.join("mirror", "pbs.front")', "pbs.front: already fed by hwp.back; a port is fed by one beam, and pbs.side is free",
            'train.join("mirror.front", "pbs.side")'),
    Mistake('train.along("pbs.transmitted", fa.Lens(focal=1.0), fa.Mirror())', "place, and pbs.reflected is free", '"pbs.reflected"'),
    Mistake('train.retro("pbs.transmitted", fa.Mirror())', "place, and pbs.reflected is free", '"pbs.reflected"'),
    Mistake('train.along("mirror", fa.Lens(focal=1.0), "cam")', "one beam, and cam2.in is free", '"cam2.in"'),
    Mistake('train.along("bs2.reflected", fa.Detector(name="d3"))', "d2.in; light leaving a port goes to one place; a splitter",
            'train.add(fa.BeamSplitter(name="splitter"))', train=full),
    Mistake('train.along("m1", "bs2.side")', "m1.front: already joined to bs2.front; light leaving a port goes to one place; a",
            'train.add(fa.BeamSplitter(name="splitter"))', train=full),
    # Parts joined to themselves
    Mistake('train.join("qwp", "qwp")', "qwp -> qwp; a part cannot be joined to itself", 'train.join("qwp", "cam2.in")'),
    Mistake('train.join("mirror.front", "mirror.front")', "mirror.front -> mirror.front; a part cannot be joined to itself",
            'train.join("mirror.front", "cam2.in")'),
    # Names given twice or badly
    Mistake('train.add(fa.Lens(focal=1.0, name="hwp"))', "hwp: a part of this name is already in the train", 'name="hwp1"'),
    Mistake('train.along("pbs.reflected", train.elements["qwp"], "cam2")',
            "a part that is met a second time is written as its name", '"qwp"'),
    Mistake('train.add(fa.Lens(focal=1.0, name="arm.lens"))', "'arm.lens' as the name of a part; a name is a word without dots",
            'name="arm_lens"'),
    Mistake('train.add(fa.Lens(focal=1.0, name="wavelength"))', "'wavelength' as the name of a part", 'name="wavelength_part"'),
    # Kinds in files
    Mistake("""fa.Train.from_text(train.to_text().replace('"Laser"', '"os.system"'))""", "laser: unknown kind 'os.system'",
            '"kind": "FreeSpace"', fa.FileFormatError),
    # Things that are no parts
    Mistake('train.along("pbs.reflected", 500*mm, "cam2")', "float in place of a part; a train takes parts",
            "fa.FreeSpace(0.5)"),
    Mistake("train.add(fa.Lens)", "Lens in place of a part", 'fa.HalfWavePlate(fast=22.5*deg, name="hwp")'),
    Mistake('train.join("bs", "cam2")', "'bs': no part of this name; the train has the parts laser", '"pbs"'),
    Mistake('train.join("zzz", "cam2")', "'zzz': no part of this name; the train has the parts laser", "print(train)"),
    Mistake('train.add(fa.Lens(focal=1.0, name="a/b"))', "'a/b' as the name of a part; a name is a word without dots, slashes",
            'name="a_b"'),
    Mistake("train.with_changes([1])", "changes = [1]; changes are written", '{"wavelength": 633*nm}', fa.ParameterError),
    # Things that are no ports
    Mistake('train.route(train.elements["pbs"])', "PolarizingBeamSplitter in place of a port; a port is the name", '"pbs"'),
    Mistake("train.route(3)", "int in place of a port; a port is the name of a part", '"cam2"'),
    # Loops
    Mistake('train.loop("pbs.reflected", fa.Mirror(name="m1"), "pbs.reflected")', "loop: pbs.reflected at both ends",
            'train.retro("pbs.reflected", fa.Mirror())'),
    # A splitter in the middle of a path
    Mistake('train.along("mirror", "pbs.reflected", "cam2")', "pbs.reflected: 2 ways on from this face",
            'train.along("mirror", "pbs.reflected")'),
    Mistake('train.add(fa.BeamSplitter(name="bs")); train.along("mirror", "bs.reflected", "cam2")', "bs.reflected: 2 ways on",
            'train.along("mirror", "bs"); train.along("bs.reflected", "cam2")'),
    # Changes
    Mistake('train.with_changes({"hpw.fast": 0.1})', "'hpw': no part of this name", '"hwp"'),
    Mistake('train.with_changes({"hwp.fats": 0.1})', "hwp: no parameter 'fats'; HalfWavePlate has the parameters fast, slow",
            '"hwp.fast"', fa.ParameterError),
    Mistake('train.with_changes({"hwp": 0.1})', "'hwp': no parameter named", '"hwp.fast"'),
    Mistake('train.with_changes({"wavelenght": 633*nm})', "'wavelenght': no parameter named", '"wavelength"'),
    # The train as a whole
    Mistake('train.route("cam")', "bench: no source among lens, cam; a train needs a laser",
            'train.along(fa.Laser(waist=0.8*mm, power=5*mW, state=fa.H, name="laser"), "lens")', train=dark),
    Mistake("train.validate()", "bench: no source among no parts; a train needs a laser",
            'train.along(fa.Laser(waist=0.8*mm, power=5*mW, state=fa.H, name="laser"))', train=empty),
    Mistake('train.route("cam2")', "cam2.in: not on any path from a laser; no light gets there", 'train.join("pbs.reflected", "cam2.in")'),
    Mistake('train.join("qwp", "cam2"); train.route("cam2")', "cam2.in: not on any path from a laser", 'train.join("pbs.reflected", "qwp.front")'),
    Mistake('train.add(fa.Camera(pixel=3.45*um, name="cam2")); train.route("cam2")', "cam2.in: not on any path from a laser",
            'train.add(fa.BeamSplitter(name="splitter"))', train=complete),
]  # fmt: skip


@pytest.mark.parametrize("mistake", MISTAKES, ids=lambda m: m.id)
def test_a_mistake_is_told_in_one_sentence(mistake):
    train = mistake.train()
    with pytest.raises(mistake.kind) as caught:
        exec(mistake.code, {**NAMES, "train": train})
    assert mistake.says in str(caught.value)
    assert caught.value.fix == mistake.fix
    assert "\n" not in str(caught.value)
    assert len(str(caught.value)) < 320


FIXES = [m for m in MISTAKES if m.fix.startswith("train.") and "in place of a part" not in m.says]


@pytest.mark.parametrize("mistake", FIXES, ids=lambda m: m.id)
def test_the_fix_can_be_pasted_in_place_of_the_mistake(mistake):
    train = mistake.train()
    *kept, _ = mistake.code.split("; ")
    exec("; ".join(kept), {**NAMES, "train": train})
    before = train.to_text()
    exec(mistake.fix, {**NAMES, "train": train})
    assert train.to_text() != before


@pytest.mark.parametrize("mistake", [m for m in MISTAKES if m not in FIXES], ids=lambda m: m.id)
def test_a_fix_that_is_a_word_is_valid_code(mistake):
    code = f"dict({mistake.fix})" if mistake.fix.startswith("name=") else mistake.fix
    code = f"{{{code}}}" if code.startswith('"kind": ') else code
    compile(code, "fix", "eval")


def test_a_lit_loop_is_a_cavity_and_no_mistake():
    ring().validate()


def test_a_loop_without_light_is_dark_parts_only():
    train = complete().along(fa.FreeSpace(distance=0.1, name="a"), fa.FreeSpace(distance=0.1, name="b"), "a")
    with pytest.warns(fa.WiringWarning, match="no light reaches it"):
        train.validate()
