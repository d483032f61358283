import pytest

from fastaxis.errors import ParameterError
from fastaxis.plan import Grid


@pytest.mark.parametrize("samples", [15, 17, 8, 64.5])
def test_samples_must_be_even_and_enough(samples):
    with pytest.raises(ParameterError, match="samples is an even number"):
        Grid(samples, 1e-2)


@pytest.mark.parametrize("window", [0.0, -1e-3, 1000.0])
def test_window_is_a_length(window):
    with pytest.raises(ParameterError, match="window is the side"):
        Grid(64, window)
