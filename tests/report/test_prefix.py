import pytest

from fastaxis.report.prefix import prefixed, readable


@pytest.mark.parametrize(
    ("value", "shown"),
    [
        (5e-3, "5.00 mW"),
        (0.9999996e-3, "1.00 mW"),  # rounded before the prefix is chosen
        (999e-6, "999 µW"),
        (1.0, "1.00 W"),
        (1234.0, "1.23 kW"),
        (-2.5e-9, "-2.50 nW"),
        (0.0, "0 W"),
    ],
)
def test_three_digits_and_a_prefix(value, shown):
    assert readable(value, "W") == shown


def test_the_factor_brings_the_largest_value_between_1_and_1000():
    for value in (3.2e-14, 7e-10, 1e-6, 0.5e-3, 20.0):
        factor, unit = prefixed(value, "W")
        assert 1 <= value * factor * (1 + 1e-12) < 1000
        assert unit.endswith("W")


def test_no_light_has_no_prefix():
    assert prefixed(0.0, "W") == (1.0, "W")
