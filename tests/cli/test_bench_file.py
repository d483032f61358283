import pytest

from fastaxis.cli.bench_file import BenchFileError, read_bench
from fastaxis.errors import WiringError


def test_train_and_settings_are_taken(bench):
    path = bench('train = fa.Train(wavelength=532*nm, name="x")\nsettings = (fa.H,)')
    found = read_bench(path)
    assert found.train.name == "x"
    assert found.settings[0].label == "H"
    assert found.path == path


def test_settings_may_be_left_out(bench):
    assert read_bench(bench("train = fa.Train(wavelength=532*nm)")).settings is None


@pytest.mark.parametrize(
    ("text", "line", "message"),
    [
        ("a = 1\nb = fa.Lenz(focal=1)", 4, "AttributeError: module 'fastaxis' has no attribute 'Lenz'"),
        ("1/0", 3, "ZeroDivisionError"),
        ("train = (", 3, "'(' was never closed"),
        ("p = fa.QPlate(q=0.3, name='qp')", 3, "qp: q = 0.3; q must be a multiple of 1/2"),
        ("def f():\n    raise ValueError('two\\nlines')\nf()", 4, "ValueError: two lines"),
        ("import sys\nsys.exit(3)", 4, "SystemExit: 3"),
    ],
)
def test_a_mistake_is_one_line_with_its_place(bench, text, line, message):
    path = bench(text)
    with pytest.raises(BenchFileError) as caught:
        read_bench(path)
    said = str(caught.value)
    assert said.startswith(f"{path}:{line}: ")
    assert message in said
    assert "\n" not in said


def test_a_bench_without_a_train_is_told_what_to_define(bench):
    with pytest.raises(WiringError, match=r"no 'train' in it; a bench file defines train \(fix: train = fa.Train"):
        read_bench(bench("trane = 1"))


def test_a_train_of_another_kind_is_refused(bench):
    with pytest.raises(WiringError, match="train is int"):
        read_bench(bench("train = 5"))


def test_a_bench_may_keep_parts_in_a_file_beside_it(bench, tmp_path):
    (tmp_path / "drawer_of_parts.py").write_text("NAME = 'from the drawer'")
    path = bench("from drawer_of_parts import NAME\ntrain = fa.Train(wavelength=532*nm, name=NAME)")
    assert read_bench(path).train.name == "from the drawer"


def test_bytes_that_are_no_text(tmp_path):
    path = tmp_path / "bench.py"
    path.write_bytes(b"train = 1\x00")
    with pytest.raises(BenchFileError) as caught:
        read_bench(path)
    assert str(caught.value).startswith(f"{path}: ")


def test_a_bench_that_is_not_there(tmp_path):
    with pytest.raises(BenchFileError, match=r"gone\.py: there is no such file; a bench is a Python file"):
        read_bench(tmp_path / "gone.py")


def test_a_file_that_may_not_be_read_is_named_once(bench):
    path = bench("open('gone.csv')")
    with pytest.raises(BenchFileError) as caught:
        read_bench(path)
    assert str(caught.value) == f"{path}:3: gone.csv cannot be read or written: No such file or directory"
