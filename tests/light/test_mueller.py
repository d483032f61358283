"""Mueller matrices beside Jones matrices."""

import numpy as np
import pytest

from fastaxis.light import muellers, stokes


def test_mueller_matrices_do_to_stokes_what_jones_matrices_do_to_fields():
    numbers = np.random.default_rng(2)
    jones = numbers.normal(size=(5, 2, 2)) + 1j * numbers.normal(size=(5, 2, 2))
    field = numbers.normal(size=2) + 1j * numbers.normal(size=2)
    expected = np.array([stokes(matrix @ field) for matrix in jones])
    assert muellers(jones) @ stokes(field) == pytest.approx(expected, rel=1e-12)


def test_the_receivers_signs():
    """A quarter-wave plate with its fast axis at 45 deg makes H right-handed, S3 = +1; a perfect mirror turns S2 and S3."""
    quarter = np.array([[1, -1j], [-1j, 1]]) / np.sqrt(2)
    found = muellers(np.array([quarter, np.diag([1, -1])]))
    assert found[0] @ [1, 1, 0, 0] == pytest.approx([1, 0, 0, 1], abs=1e-15)
    assert found[1] @ [1, 0.2, 0.3, 0.4] == pytest.approx([1, 0.2, -0.3, -0.4], abs=1e-15)
