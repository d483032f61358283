"""Where light begins and ends: laser, camera, detector, dump."""

import numpy as np
import pytest
import sympy

from fastaxis.elements import ORIENTATIONS, BeamDump, Camera, Detector, Laser
from fastaxis.errors import ParameterError
from fastaxis.light import (
    UNPOLARIZED,
    Beam,
    D,
    Gaussian,
    H,
    LaguerreGauss,
    Term,
    V,
    linear,
    partially_polarized,
)
from fastaxis.units import mm, mW, nm, um

TWO = Beam((Term(1, Gaussian(1 * mm), H), Term(1j, LaguerreGauss(0, 1, 1 * mm), V)))


class TestLaser:
    def test_waist_makes_a_gaussian_in_one_state(self):
        source = Laser(waist=0.8 * mm, power=5 * mW, state=D, waist_at=0.2, centre=(0.1 * mm, 0)).source
        (component,) = source.components
        (term,) = component.beam.terms
        assert source.power == 5 * mW
        assert term.state == D
        assert term.mode == Gaussian(0.8 * mm, waist_at=0.2, centre=(0.1 * mm, 0))
        assert component.wavelength is None

    def test_horizontal_if_nothing_is_said(self):
        assert Laser(waist=1 * mm).source.beam.state == H

    def test_any_mode(self):
        mode = LaguerreGauss(0, 2, 1 * mm)
        assert Laser(mode=mode).source.beam.terms[0].mode is mode

    def test_unpolarized_light_is_two_components_of_half_the_power(self):
        source = Laser(waist=1 * mm, power=4 * mW, state=UNPOLARIZED).source
        assert source.powers == (2 * mW, 2 * mW)
        assert [component.beam.state for component in source.components] == [H, V]

    def test_partly_polarized_light_keeps_its_stokes_parameters(self):
        source = Laser(waist=1 * mm, power=1.0, state=partially_polarized(D, 0.6)).source
        total = sum(p * c.beam.state.stokes for p, c in zip(source.powers, source.components, strict=True))
        assert total == pytest.approx([1, 0, 0.6, 0], abs=1e-15)

    def test_coherent_sum(self):
        assert Laser(beam=TWO).source.beam is TWO

    def test_incoherent_parts_with_and_without_their_own_wavelength(self):
        laser = Laser(incoherent=[(0.75, TWO), (0.25, TWO, 633 * nm)], power=2 * mW)
        assert laser.source.powers == (1.5 * mW, 0.5 * mW)
        assert [component.wavelength for component in laser.source.components] == [None, 633 * nm]

    def test_letters_are_found_in_every_place(self):
        w, p, a = sympy.symbols("w P alpha", positive=True)
        assert Laser(waist=w, power=p, state=linear(a)).symbols == {w, p, a}

    def test_a_new_shape_takes_the_place_of_the_old(self):
        laser = Laser(waist=0.8 * mm, waist_at=0.1, state=D, name="laser")
        mode = LaguerreGauss(0, 1, 1 * mm)
        assert laser.changed(mode=mode).source.beam.terms[0] == Term(1, mode, D)
        assert laser.changed(beam=TWO).source.beam is TWO
        assert laser.changed(beam=TWO).changed(waist=1 * mm).source.beam.state == H
        assert laser.changed(centre_x=1 * mm).centre == (1 * mm, 0.0)

    @pytest.mark.parametrize(("given", "fix"), [({"power": 5}, "power=5*mW"), ({"waist": 0.15}, "waist=0.15*mm")])
    def test_missing_units_are_cautions(self, given, fix):
        laser = Laser(**{"waist": 0.8 * mm, "power": 5 * mW} | given)
        (caution,) = laser.cautions(532 * nm)
        assert caution.fix == fix
        assert laser.changed(**eval(f"dict({fix})", {"mm": mm, "mW": mW})).cautions(532 * nm) == []

    def test_has_one_face_and_no_passages(self):
        laser = Laser(waist=1 * mm)
        assert (laser.faces, laser.entry, laser.exit, laser.passages(532 * nm)) == (("out",), None, "out", {})


class TestCamera:
    picture = np.array([[1, 2, 3], [4, 5, 6]])  # row 0 is the lowest: 1 at the lower left, 6 at the upper right

    # Turning a picture drawn with the origin at the lower left, by hand.
    @pytest.mark.parametrize(
        ("orientation", "frame"),
        [
            ("upright", [[1, 2, 3], [4, 5, 6]]),
            ("turned 90", [[4, 1], [5, 2], [6, 3]]),
            ("turned 180", [[6, 5, 4], [3, 2, 1]]),
            ("turned 270", [[3, 6], [2, 5], [1, 4]]),
            ("mirrored", [[3, 2, 1], [6, 5, 4]]),
            ("mirrored, turned 90", [[6, 3], [5, 2], [4, 1]]),
            ("mirrored, turned 180", [[4, 5, 6], [1, 2, 3]]),
            ("mirrored, turned 270", [[1, 4], [2, 5], [3, 6]]),
        ],
    )
    def test_the_eight_orientations(self, orientation, frame):
        shape = np.array(frame).shape
        camera = Camera(pixel=3.45 * um, shape=shape, orientation=orientation)
        assert camera.seen == self.picture.shape
        assert camera.oriented(self.picture).tolist() == frame
        assert camera.oriented(np.stack([self.picture] * 4)).shape == (4, *shape)

    def test_they_are_eight_different_ones(self):
        square = np.arange(4).reshape(2, 2)
        frames = {str(Camera(pixel=1 * um, shape=(2, 2), orientation=o).oriented(square)) for o in ORIENTATIONS}
        assert len(frames) == 8

    def test_four_quarter_turns_restore(self):
        frame = self.picture
        for _ in range(4):
            frame = Camera(pixel=1 * um, shape=(1, 1), orientation="turned 90").oriented(frame)
        assert frame.tolist() == self.picture.tolist()

    def test_shape_is_kept_as_whole_numbers(self):
        assert Camera(pixel=1 * um, shape=[512.0, 640]).shape == (512, 640)


def test_ends_take_all_and_pass_nothing():
    for part in (Camera(pixel=1 * um), Detector(), BeamDump()):
        assert (part.faces, part.entry, part.exit) == (("in",), "in", None)
        assert part.passages(532 * nm) == {}
    assert Detector().shape == (1, 1)


def test_an_end_has_no_parameter_to_change():
    with pytest.raises(ParameterError, match=r"bucket: no parameter 'gain'; Detector has the parameters \(none\)"):
        Detector(name="bucket").changed(gain=2)
    assert Detector().changed(name="bucket").name == "bucket"
