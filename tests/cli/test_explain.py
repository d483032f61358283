import fastaxis as fa


def test_parts_plan_and_drawing(bench, run, tmp_path):
    ran = run("explain", bench(), "--out", "out")
    assert ran.code == 0
    assert "QuarterWavePlate" in ran.out
    assert "plan for cam: engine" in ran.out
    assert "cam: no reflection: upright" in ran.out
    assert {path.name for path in (tmp_path / "out").iterdir()} == {"bench.png", "bench.pdf"}
    assert ran.out.count(fa.stamp()) == 1
    assert ran.err == ""


def test_cards_only_on_request(bench, run):
    path = bench()
    assert "set to" not in run("explain", path, "--format", "png").out
    assert "set to" in run("explain", path, "--format", "png", "--cards").out


def test_the_view_is_kept_apart_from_the_listing(bench, run):
    text = """\
    train = fa.Train(wavelength=532*nm)
    train.along(fa.Laser(waist=1*mm, state=fa.R, name="laser"), fa.Detector(name="meter"))
    """
    ran = run("explain", bench(text), "--format", "png", "--cards", "--view", "source")
    listing, rest = ran.out.split("(in this listing R and L are named by the receiver; below, by the source)")
    assert "state R" in listing
    assert "Gaussian, L" in rest
    assert fa.stamp() not in rest


def test_open_ports_with_power_and_caution(bench, run):
    text = """\
    train = fa.Train(wavelength=532*nm)
    train.along(fa.Laser(waist=1*mm, power=4*mW, name="laser"), fa.BeamSplitter(name="bs"), fa.BeamDump(name="dump"))
    """
    ran = run("explain", bench(text), "--format", "png")
    assert ran.code == 0
    assert "open: bs.reflected, 2.00 mW" in ran.out
    assert "Laser caution: power leaves at bs.reflected (2.00 mW)" in ran.err


def test_a_port_without_light_but_roundings_is_dark(bench, run):
    text = """\
    train = fa.Train(wavelength=532*nm)
    train.along(fa.Laser(waist=1*mm, power=4*mW, state=fa.linear(0.3), name="laser"), fa.Polarizer(axis=0.3),
                fa.HalfWavePlate(fast=0.15), fa.PolarizingBeamSplitter(name="pbs"), fa.BeamDump(name="dump"))
    """
    ran = run("explain", bench(text), "--format", "png")
    assert "open: pbs.reflected, dark" in ran.out
    assert "pbs.reflected" not in ran.err


def test_a_wrong_bench_is_drawn_before_it_is_refused(bench, run, tmp_path):
    text = """\
    train = fa.Train(wavelength=532*nm).along(fa.Lens(focal=1*m, name="lens"), fa.Camera(pixel=5*um, name="cam"))
    """
    ran = run("explain", bench(text), "--format", "png", "--out", "out")
    assert ran.code == 1
    assert (tmp_path / "out" / "bench.png").exists()
    assert "a train needs a laser" in ran.err


def test_arms_that_meet_are_drawn_and_planned(bench, run, tmp_path):
    text = """\
    train = fa.Train(wavelength=532*nm)
    train.along(fa.Laser(waist=1*mm, name="laser"), fa.BeamSplitter(name="in"), fa.Mirror(name="m1"))
    train.along("m1", fa.BeamSplitter(name="out"), fa.Detector(name="a"))
    train.along("in.reflected", fa.Mirror(name="m2"), "out.side").along("out.reflected", fa.Detector(name="b"))
    """
    ran = run("explain", bench(text), "--format", "png", "--out", "out")
    assert ran.code == 0
    assert (tmp_path / "out" / "bench.png").exists()
    assert "light comes by several paths" in ran.out


def test_letters_are_explained_without_numbers(bench, run):
    text = """\
    import sympy
    train = fa.Train(wavelength=532*nm)
    plate = fa.HalfWavePlate(fast=sympy.Symbol("theta", real=True), name="hwp")
    train.along(fa.Laser(waist=1*mm, name="laser"), plate, fa.Detector(name="meter"))
    """
    ran = run("explain", bench(text), "--format", "png")
    assert ran.code == 0
    assert "letters: theta" in ran.out


def test_the_watts_are_told_and_open_ports_stand_together(bench, run):
    text = """\
    train = fa.Train(wavelength=532*nm)
    train.along(fa.Laser(waist=1*mm, power=4*mW, name="laser"), fa.BeamSplitter(name="a"), fa.BeamSplitter(name="b"))
    """
    told = run("explain", bench(text), "--format", "png").out
    assert "open: a.reflected, 2.00 mW\nopen: b." in told
    assert "power of the lasers 4 mW" in told
    assert "sum of the ends 4 mW" in told
    assert told.count(fa.stamp()) == 1
