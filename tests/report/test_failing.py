import numpy as np

from fastaxis.report.failing import draw_failing
from fastaxis.testing import BenchError


def test_every_frame_has_its_own_scale_and_the_words_stand_above():
    frames = {"recorded": np.eye(8) * 200.0, "got, H": np.eye(8) * 1e-6}
    error = BenchError("Saltpan: cam", expected="two lobes", got="none", cause="qp: left out", frames=frames)
    figure = draw_failing(error)
    shown = {axes.get_title(): axes.images[0].get_clim() for axes in figure.axes if axes.images}
    assert shown == {"recorded": (0, 200.0), "got, H": (0, 1e-6)}
    assert "likely cause: qp: left out" in figure.get_suptitle()
