"""The first moments of the command line."""

import os
import signal
import subprocess
import sys
import textwrap
from pathlib import Path

import pytest

import fastaxis
from fastaxis.cli import entry


def test_the_entry_loads_nothing_slow():
    code = "import sys, fastaxis.cli; print(sorted({'numpy', 'sympy', 'matplotlib', 'rich'} & set(sys.modules)))"
    told = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert told.stdout == "[]\n"


def test_ctrl_c_is_caught_before_anything_of_note_is_loaded():
    # What loads before main is called is told with a traceback; -S and -I, so that nothing else loads it.
    package = Path(fastaxis.__file__).parent.parent
    code = f"import sys; sys.path.insert(0, {str(package)!r}); import fastaxis.cli; print({{'typing', 'collections'}} & set(sys.modules))"
    told = subprocess.run([sys.executable, "-S", "-I", "-c", code], capture_output=True, text=True, check=True)
    assert told.stdout == "set()\n"


@pytest.mark.skipif(os.name != "posix", reason="signals as a terminal sends them")
def test_ctrl_c_while_libraries_load_is_130_and_one_sentence(tmp_path):
    # Numpy is made to take its time, so that the signal arrives while it loads.
    (tmp_path / "numpy.py").write_text("import os, signal, time\nos.kill(os.getpid(), signal.SIGINT)\ntime.sleep(5)\n")
    start = textwrap.dedent(f"""
        import sys
        sys.path.insert(0, {str(tmp_path)!r})
        from fastaxis.cli import main
        sys.exit(main(["predict", "bench.py"]))
    """)
    ran = subprocess.run([sys.executable, "-c", start], capture_output=True, text=True, check=False)
    assert ran.returncode == entry.INTERRUPTED == 130
    assert ran.stderr.startswith("fastaxis: stopped;")
    assert len(ran.stderr.splitlines()) == 1
