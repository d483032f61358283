"""Memory that is kept for the next arrays comes without new pages."""

import platform
import subprocess
import sys

import pytest

COUNTED = """
import resource
import numpy as np
{}
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
    asked = "from fastaxis.engines.azimuthal.pages import keep_pages; keep_pages()"
    code = COUNTED.format(asked)
    count = int(subprocess.run([sys.executable, "-c", code], check=True, capture_output=True, text=True).stdout)
    # 160 arrays of 128 pages each, if they were new; some that other work needs may be.
    assert count < 1000
