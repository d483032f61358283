import pytest
import sympy

from fastaxis.elements import HalfWavePlate, Laser, QPlate, Retarder
from fastaxis.errors import SymbolError
from fastaxis.laws import Amplitude, AxisLaw
from fastaxis.light import linear
from fastaxis.plan import make_plan
from fastaxis.plan.binding import bound
from fastaxis.train import Train
from fastaxis.units import mm, nm

theta, eta = sympy.symbols("theta eta", real=True)


def test_a_letter_is_refused_by_the_name_of_its_parameter(bench):
    with pytest.raises(SymbolError) as refused:
        make_plan(bench(HalfWavePlate(fast=theta + eta, name="hwp")), "cam")
    assert refused.value.got == "hwp.fast = eta + theta has no value"
    assert refused.value.fix == 'train.with_values({"eta": 0.3, "theta": 0.3})'


def test_the_fix_of_the_message_works(bench):
    train = bench(HalfWavePlate(fast=theta, name="hwp"))
    with pytest.raises(SymbolError) as refused:
        make_plan(train, "cam")
    make_plan(eval(refused.value.fix), "cam")


def test_a_letter_in_the_state_of_the_laser_is_refused(bench):
    with pytest.raises(SymbolError, match="laser.state"):
        make_plan(bench(state=linear(theta)), "cam")


def test_a_letter_for_the_wavelength_is_refused():
    train = Train(wavelength=sympy.Symbol("lambda", positive=True)).along(Laser(waist=1 * mm), HalfWavePlate(fast=0))
    with pytest.raises(SymbolError, match="wavelength = lambda has no value"):
        make_plan(train, "plate1")


def test_exact_numbers_become_floats(bench):
    plan = make_plan(bench(QPlate(q=sympy.Rational(1, 2), offset=sympy.pi / 3), Retarder(fast=sympy.pi / 8)), "cam")
    law = plan.steps[0].law
    assert type(law.order) is float and type(law.angle) is float
    assert law.order == 0.5 and law.angle == float(sympy.pi / 3)


def test_data_without_exact_numbers_is_the_same_object():
    law = AxisLaw(Amplitude(1.0, 0.2), angle=0.1)
    assert bound(law) is law
    assert bound(AxisLaw(Amplitude(sympy.Integer(1), 0.2), angle=0.1)) == law


def test_wavelengths_of_the_parts_of_a_source_are_asked_each(bench):
    from fastaxis.light import Beam, Gaussian, H, Term

    beam = Beam((Term(1, Gaussian(waist=1 * mm), H),))
    laser = Laser(incoherent=((0.25, beam, 500 * nm), (0.75, beam)), power=1.0)
    plate = Retarder(fast=0.0, retardance=1.0, design=600 * nm)
    plan = make_plan(Train(wavelength=600 * nm).along(laser, plate), "plate1")
    assert [branch.wavelength for branch in plan.branches] == [500 * nm, 600 * nm]
    assert [branch.power for branch in plan.branches] == [0.25, 0.75]
    phases = [branch.steps[0].law.matrix[1][1] for branch in plan.branches]
    # exp(+i d/2) across the fast axis, and the retardance goes as 1/wavelength.
    assert phases[0] == pytest.approx(complex(sympy.exp(sympy.I * 0.6).evalf()), abs=1e-15)
    assert phases[1] == pytest.approx(complex(sympy.exp(sympy.I * 0.5).evalf()), abs=1e-15)
