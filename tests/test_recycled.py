"""Memory that frames leave behind."""

import gc
import mmap
import pickle
import platform
import subprocess
import sys
from collections import deque

import numpy as np
import pytest

import fastaxis as fa
from fastaxis import recycled
from fastaxis.engines.memory import UP_TO
from fastaxis.recycled import PAGE, SMALLEST, empty, keep, scratch

offered = pytest.mark.skipif(recycled.OFFERED is None, reason="this system takes memory back at once")
BIG = (2 * SMALLEST // 8,)


@pytest.fixture(autouse=True)
def nothing_free(monkeypatch):
    """Each test with memory of its own."""
    monkeypatch.setattr(recycled, "_free", deque())


def place(array):
    return array.__array_interface__["data"][0]


@pytest.mark.parametrize("shape", [(0, 3), (3,), (2, SMALLEST // 8), (SMALLEST // 8 + 1,)])
@pytest.mark.parametrize("kind", [np.float64, np.float32])
def test_it_is_an_array_like_any_other(shape, kind):
    array = empty(shape, kind)
    assert type(array) is np.ndarray and array.shape == shape and array.dtype == kind
    assert array.flags.c_contiguous and array.flags.writeable and array.flags.aligned
    array[...] = 3
    assert (pickle.loads(pickle.dumps(array)) == 3).all() and (array.copy() == 3).all()


@offered
def test_memory_nobody_holds_is_used_again():
    first = empty(BIG)
    where = place(first)
    del first
    assert place(empty(BIG)) == where


@offered
@pytest.mark.parametrize(
    "view", [lambda a: a[5:9], lambda a: a.reshape(2, -1).T, memoryview, lambda a: a.view(np.int64)]
)
def test_memory_somebody_still_looks_at_is_not_used_again(view):
    first = empty(BIG)
    first[:] = 7
    kept, where = view(first), place(first)
    del first
    gc.collect()
    second = empty(BIG)
    second[:] = 0
    assert place(second) != where and np.asarray(kept).any()


@offered
def test_few_frames_never_hold_the_memory_of_many():
    many = empty((4 * BIG[0],))
    del many
    few = empty(BIG)
    assert len(recycled._free) == 1
    del few
    assert sorted(map(len, recycled._free)) == [2 * SMALLEST, 8 * SMALLEST]


@offered
def test_no_more_than_so_much_is_kept(monkeypatch):
    monkeypatch.setattr(recycled, "_kept", 5 * SMALLEST)
    arrays = [empty(BIG) for _ in range(4)]
    places = [place(array) for array in arrays]
    while arrays:
        arrays.pop(0)
    assert len(recycled._free) == 2
    arrays = [empty(BIG) for _ in range(2)]
    assert [place(array) for array in arrays] == places[2:]  # those that waited longest are gone
    arrays.clear()
    huge = empty((6 * SMALLEST // 8,))
    del huge
    assert len(recycled._free) == 2


def test_systems_that_take_memory_at_once_get_plain_arrays(monkeypatch):
    monkeypatch.setattr(recycled, "OFFERED", None)
    assert empty(BIG).flags.owndata


@offered
def test_sizes_are_whole_pages():
    odd = empty((SMALLEST // 8 + 1,))
    assert len(odd.base._memory) == SMALLEST + PAGE and isinstance(odd.base._memory.base.obj, mmap.mmap)


@offered
def test_large_planes_between_steps_leave_nothing_behind(monkeypatch):
    monkeypatch.setattr(recycled, "SCRATCH", 2 * SMALLEST)
    large, small = scratch((2 * SMALLEST // 8 + 1,)), scratch(BIG)
    assert large.flags.owndata
    del large, small
    assert len(recycled._free) == 1


class Refusing:
    """Memory of a system that doesn't know of large pages, or does not take offers."""

    def __init__(self, *_, **__):
        raise OSError(12, "Cannot allocate memory")


@offered
def test_where_the_system_refuses_numpy_is_asked(monkeypatch):
    monkeypatch.setattr(mmap, "mmap", Refusing)
    assert empty(BIG).flags.owndata


@offered
def test_advice_the_system_does_not_know_is_no_error(monkeypatch):
    monkeypatch.setattr(mmap, "MADV_HUGEPAGE", -1, raising=False)
    monkeypatch.setattr(recycled, "OFFERED", -1)
    array = empty(BIG)
    array[:] = 1
    del array
    assert not recycled._free


@offered
def test_who_wants_nothing_remembered_gets_all_memory_back():
    array = empty(BIG)
    del array
    try:
        fa.remember_light(up_to=0)
        assert not recycled._free
        array = empty(BIG)
        del array
        assert not recycled._free
    finally:
        fa.remember_light(up_to=UP_TO)
    assert recycled._kept == recycled.KEPT


@offered
def test_light_forgotten_takes_the_memory_of_frames_along():
    array = empty(BIG)
    del array
    fa.forget_light()
    assert not recycled._free


def test_so_much_is_held_and_no_more(monkeypatch):
    monkeypatch.setattr(recycled, "_kept", recycled.KEPT)
    arrays = [empty(BIG) for _ in range(3)]
    arrays.clear()
    keep(4 * SMALLEST)
    assert len(recycled._free) == (2 if recycled.OFFERED else 0)


COUNTED = """
import resource
import numpy as np
import fastaxis.recycled
def faults():
    before = resource.getrusage(resource.RUSAGE_SELF).ru_minflt
    for _ in range(20):
        held = [np.ones(1 << 16) for _ in range(8)]
        del held
    return resource.getrusage(resource.RUSAGE_SELF).ru_minflt - before
faults()
print(faults())
"""


@pytest.mark.skipif(platform.libc_ver()[0] != "glibc", reason="of the GNU C library")
def test_arrays_of_half_a_megabyte_take_no_new_pages():
    count = int(subprocess.run([sys.executable, "-c", COUNTED], check=True, capture_output=True, text=True).stdout)
    # 160 arrays of 128 pages each, if they were new; some that other work needs may be.
    assert count < 1000
