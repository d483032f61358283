from fastaxis.elements import Aperture, FreeSpace, HalfWavePlate, Lens, Mirror, QPlate, SpiralPlate, Wedge
from fastaxis.plan import make_plan
from fastaxis.units import mm, mrad


def test_a_plan_says_what_was_fused_which_engine_and_the_samples(bench):
    parts = [
        HalfWavePlate(fast=0.1, name="hwp"),
        QPlate(q=0.5, name="qp"),
        FreeSpace(0.3),
        Lens(focal=0.3),
        FreeSpace(0.3),
    ]
    text = str(make_plan(bench(*parts), "cam", engine="grid"))
    assert text.startswith("plan for cam: engine grid, because asked for")
    assert "spaces and lenses merged into ABCD sections (5 -> 3 steps)" in text
    assert "2. qp: axis law, q = 0.5; window" in text
    assert "3. space1, lens1, space2: ABCD (0, 300 mm; -3.333/m, 0), path 600 mm; single transform -> window" in text
    assert text.splitlines()[-1].startswith("signs: exp(-iwt)")


def test_a_plan_lists_its_parts_before_and_after_the_passes(bench):
    parts = [HalfWavePlate(fast=0.1), QPlate(q=0.5, name="qp"), FreeSpace(0.3), Lens(focal=0.3), Mirror()]
    lines = str(make_plan(bench(*parts), "cam", engine="grid")).splitlines()
    assert lines[1] == "  before: plate1 | qp | space1 | lens1 | mirror1 (2 steps)"
    assert "  after:  plate1 | qp | mirror1 | space1 + lens1 | mirror1" in lines
    assert "before" not in str(make_plan(bench(QPlate(q=0.5)), "cam", engine="grid"))


def test_scalar_parts_and_reflections_are_named(bench):
    parts = [SpiralPlate(charge=-2), Wedge(x=1 * mrad), Aperture(radius=2 * mm), FreeSpace(0.1), Mirror()]
    text = str(make_plan(bench(*parts), "cam", engine="grid"))
    assert "scalar law, charge -2, tilt (1, 0) mrad, stop Disc" in text and "x reversed" in text
    assert "scaled angular spectrum -> window" in text


def test_a_uniform_plan_needs_no_samples(bench):
    from fastaxis.light import PlaneWave

    plan = make_plan(bench(HalfWavePlate(fast=0.1), mode=PlaneWave(area=1e-6)), "cam")
    assert plan.sampling is None
    assert "uniform matrix" in str(plan) and "samples" not in str(plan)


def test_a_question_about_power_leaves_out_the_lossless_end(bench):
    train = bench(QPlate(q=0.5), Aperture(radius=1 * mm), FreeSpace(0.3), SpiralPlate(charge=1), Mirror())
    plan = make_plan(train, "mirror1.front", power_only=True)
    assert [type(step.law).__name__ for step in plan.steps] == ["AxisLaw", "JonesStep", "ScalarLaw"]
