import mpmath
import numpy as np
import pytest

from fastaxis.light.gauss import gauss_legendre


@pytest.mark.parametrize("count", [1, 2, 5, 32, 33, 128])
def test_against_forty_digits(count):
    """Roots of P_n, and weights 2/((1 - x^2) P_n'(x)^2) (DLMF 3.5.25 with table 18.3.1)."""
    nodes, weights = gauss_legendre(count)

    def legendre(root):
        value, before = mpmath.legendre(count, root), mpmath.legendre(count - 1, root)
        return value, count * (before - root * value) / (1 - root**2)

    with mpmath.workdps(40):
        for x, w in list(zip(nodes, weights, strict=True))[:: max(1, count // 6)]:
            root = mpmath.mpf(float(x))
            for _ in range(3):
                value, slope = legendre(root)
                root -= value / slope
            # The nearest doubles, give or take one.
            assert abs(x - float(root)) <= 2 * np.finfo(float).eps * max(abs(x), 1e-3)
            assert w == pytest.approx(float(2 / ((1 - root**2) * legendre(root)[1] ** 2)), rel=5e-16)


@pytest.mark.parametrize("count", [7, 64, 512, 1024])
def test_powers_up_to_twice_the_nodes(count):
    nodes, weights = gauss_legendre(count)
    for power in (0, 2, count, 2 * count - 2):
        exact = 2 / (power + 1) if power % 2 == 0 else 0.0
        # Weights add up with one rounding each at worst, in the root of their number on average.
        assert weights @ nodes**power == pytest.approx(exact, abs=1e-15)


def test_nobody_can_spoil_it_for_the_others():
    with pytest.raises(ValueError, match="read-only"):
        gauss_legendre(4)[0][0] = 1
