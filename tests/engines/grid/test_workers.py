"""Planes handed out to threads, in processes forked from one that has done so already."""

import multiprocessing
import os
import signal
import subprocess
import sys

import pytest

# Both pools are at work in the parent before it forks: the engine's and the camera's.
FORKED = """
import multiprocessing, warnings
from concurrent.futures import ProcessPoolExecutor
import numpy as np
import fastaxis as fa
from fastaxis.camera import mixing
from fastaxis.engines.grid import workers
from fastaxis.units import mm, nm, um

warnings.simplefilter("ignore", DeprecationWarning)  # of forking with threads about, which is what is tried here
train = fa.Train(wavelength=633 * nm).along(
    fa.Laser(waist=1 * mm, state=fa.H), fa.FreeSpace(100 * mm), fa.Camera(pixel=10 * um, shape=(64, 64), name="cam")
)
workers.ALONE = mixing.ALONE = 0  # hands out every plane, however small

def job(_):
    return float(train.expose("cam", [fa.H], engine="grid").frame("H").sum())

here = job(0)
assert workers._pool.cache_info().currsize and mixing._pool.cache_info().currsize
with ProcessPoolExecutor(2, mp_context=multiprocessing.get_context("fork")) as pool:
    assert np.allclose(list(pool.map(job, range(2))), here, rtol=1e-12)
"""


@pytest.mark.skipif("fork" not in multiprocessing.get_all_start_methods(), reason="no fork on this system")
def test_a_forked_process_starts_threads_of_its_own(tmp_path):
    script = tmp_path / "forked.py"
    script.write_text(FORKED)
    child = subprocess.Popen([sys.executable, str(script)], stderr=subprocess.PIPE, text=True, start_new_session=True)
    try:
        # A second of work; a process without threads would wait for ever.
        _, said = child.communicate(timeout=120)
    except subprocess.TimeoutExpired:
        os.killpg(child.pid, signal.SIGKILL)  # its processes too
        raise
    assert child.returncode == 0, said
