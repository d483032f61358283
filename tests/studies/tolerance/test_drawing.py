"""Executors, checkpoints, and a study that is killed."""

import subprocess
import sys
import textwrap
import time
from concurrent.futures import ProcessPoolExecutor, ThreadPoolExecutor

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.studies.tolerance import normal, power_at
from fastaxis.units import deg

MERITS = {"power": power_at("meter")}
ERRORS = {"pol.axis": normal(1 * deg)}


def test_all_executors_draw_the_same(malus):
    alone = malus.tolerance(ERRORS, MERITS, draws=200, seed=5, batch=40)
    with ThreadPoolExecutor(2) as threads:
        threaded = malus.tolerance(ERRORS, MERITS, draws=200, seed=5, executor=threads, batch=30)
    with ProcessPoolExecutor(1) as processes:
        pooled = malus.tolerance(ERRORS, MERITS, draws=200, seed=5, executor=processes, batch=70)
    # In batches of another size a product of matrices may round once differently.
    assert threaded.values == pytest.approx(alone.values, rel=1e-15)
    assert pooled.values == pytest.approx(alone.values, rel=1e-15)
    assert not np.array_equal(alone.values, malus.tolerance(ERRORS, MERITS, draws=200, seed=6).values)


def test_progress_and_checkpoint(malus, tmp_path):
    path, told = tmp_path / "study.npz", []

    def stop(done, draws):
        told.append((done, draws))
        if done == 40:
            raise KeyboardInterrupt

    with pytest.raises(KeyboardInterrupt):
        malus.tolerance(ERRORS, MERITS, draws=100, checkpoint=path, progress=stop, batch=20)
    resumed = []
    found = malus.tolerance(ERRORS, MERITS, draws=100, checkpoint=path, progress=lambda *a: resumed.append(a), batch=20)
    assert told == [(20, 100), (40, 100)]
    assert resumed == [(60, 100), (80, 100), (100, 100)]
    assert found.values == pytest.approx(malus.tolerance(ERRORS, MERITS, draws=100).values, rel=1e-15)
    with pytest.raises(fa.FileFormatError, match="another study"):
        malus.tolerance(ERRORS, MERITS, draws=100, seed=1, checkpoint=path)
    path.write_bytes(b"no checkpoint")
    with pytest.raises(fa.FileFormatError, match="is an .npz"):
        malus.tolerance(ERRORS, MERITS, draws=100, checkpoint=path)


def test_a_damaged_checkpoint_is_told(malus, tmp_path):
    path = tmp_path / "study.npz"
    malus.tolerance(ERRORS, MERITS, draws=20, checkpoint=path)
    whole = path.read_bytes()
    for kept in range(0, len(whole), 37):
        path.write_bytes(whole[:kept])
        with pytest.raises(fa.FileFormatError, match="is an .npz"):
            malus.tolerance(ERRORS, MERITS, draws=20, checkpoint=path)
    plain = tmp_path / "plain.npz"
    with plain.open("wb") as file:
        np.save(file, np.zeros(3))
    with pytest.raises(fa.FileFormatError, match="is an .npz"):
        malus.tolerance(ERRORS, MERITS, draws=20, checkpoint=plain)


SLOW = textwrap.dedent("""
    import sys, time, fastaxis as fa
    from fastaxis.studies.tolerance import normal
    from fastaxis.units import deg, mm, nm
    train = fa.Train(wavelength=633*nm, name="slow").along(
        fa.Laser(waist=1*mm, state=fa.H, name="laser"), fa.Polarizer(axis=30*deg, name="pol"))
    def axis(train):
        time.sleep(float(sys.argv[2]))
        return train.elements["pol"].axis
    def told(done, draws):
        print(done, flush=True)
    found = train.tolerance({"pol.axis": normal(1*deg)}, {"axis": axis}, draws=60, batch=5, checkpoint=sys.argv[1],
                            progress=told)
    print(repr(float(found.values.sum())))
""")


def test_a_killed_study_loses_at_most_one_batch(tmp_path):
    path = tmp_path / "study.npz"
    command = [sys.executable, "-c", SLOW, str(path)]
    killed = subprocess.Popen([*command, "0.02"], stdout=subprocess.PIPE, text=True)
    for line in killed.stdout:
        if int(line) >= 20:
            time.sleep(0.05)  # in the middle of a batch
            break
    killed.kill()
    killed.wait()
    killed.stdout.close()
    with np.load(path) as kept:
        done = int(kept["done"].sum())
    assert done >= 20
    *counts, total = subprocess.run([*command, "0"], capture_output=True, text=True, check=True).stdout.split()
    assert int(counts[0]) == done + 5  # it went on, and did not begin again
    whole = subprocess.run(
        [sys.executable, "-c", SLOW, str(tmp_path / "other.npz"), "0"], capture_output=True, text=True
    )
    assert whole.stdout.split()[-1] == total
