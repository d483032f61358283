import math

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.elements.surfaces import Surface, amplitude, quarter_wave_reflectance

angles = st.floats(0, 1.55)
# A few roundings of roots and quotients; beyond 1.55 rad 1/cos(incidence) would make more of them.
ROUNDING = 1e-13


@settings(max_examples=50, deadline=None)
@given(st.floats(1.0, 2.5), st.floats(1.0, 2.5), angles)
def test_clear_surfaces_lose_nothing(before, behind, incidence):
    surface = Surface(before=before, behind=behind, incidence=incidence)
    assert surface.Rp + surface.Tp == pytest.approx(1, abs=ROUNDING)
    assert surface.Rs + surface.Ts == pytest.approx(1, abs=ROUNDING)


@settings(max_examples=50, deadline=None)
@given(st.floats(0.03, 4), st.floats(0, 9), angles)
def test_absorbing_surfaces_split_the_power_too(n, k, incidence):
    # What is not reflected enters the metal: its decaying wave carries the rest away from the surface.
    surface = Surface(behind=complex(n, k), incidence=incidence)
    assert surface.Rp + surface.Tp == pytest.approx(1, abs=ROUNDING)
    assert surface.Rs + surface.Ts == pytest.approx(1, abs=ROUNDING)


@settings(max_examples=50, deadline=None)
@given(st.floats(1.0, 2.5), st.floats(0, 1.5))
def test_stokes_relations_of_the_way_back(index, incidence):
    # G. G. Stokes (1849): light sent back along the refracted beam meets r' = -r and t t' = 1 - r^2.
    there = Surface(behind=index, incidence=incidence)
    back = Surface(before=index, behind=1.0, incidence=there.refraction)
    for name in ("p", "s"):
        r, r_back = getattr(there, f"r{name}"), getattr(back, f"r{name}")
        assert r_back == pytest.approx(-r, abs=1e-12)  # the angle behind went through an arc sine
        product = getattr(there, f"t{name}") * getattr(back, f"t{name}")
        assert product == pytest.approx(1 - r * r, abs=1e-12)


@settings(max_examples=50, deadline=None)
@given(st.floats(0.03, 4), st.floats(0, 9))
def test_straight_on_p_and_s_are_one_reflection(n, k):
    surface = Surface(behind=complex(n, k), incidence=0.0)
    assert surface.rp == pytest.approx(-surface.rs, abs=ROUNDING)


def test_total_reflection_starts_at_the_critical_angle():
    critical = math.asin(1 / 1.5)
    assert not Surface(before=1.5, behind=1.0, incidence=critical - 1e-9).total
    beyond = Surface(before=1.5, behind=1.0, incidence=critical + 1e-9)
    assert beyond.total
    assert beyond.Rp == pytest.approx(1, abs=ROUNDING)
    assert beyond.Ts == pytest.approx(0, abs=ROUNDING)


def test_light_lags_when_it_reaches_into_the_thinner_medium():
    # The wave behind decays; under exp(-iwt) its reactive load makes -pi < phase < 0 for both components.
    surface = Surface(before=1.5, behind=1.0, incidence=1.0)
    assert -math.pi < amplitude(surface.rs).phase < 0
    assert -math.pi < amplitude(surface.rp).phase < amplitude(surface.rs).phase


def test_an_amplitude_keeps_power_and_phase():
    value = 0.6 * complex(math.cos(2.0), math.sin(2.0))
    kept = amplitude(value, times=2)
    assert kept.number() == pytest.approx(value**2, abs=1e-15)
    assert amplitude(complex(-0.3, -0.0)).phase == math.pi
    assert amplitude(complex(1 + 1e-15, 0)).power == 1.0


@pytest.mark.parametrize("detuning", [0.5, 1.0, 1.7, 2.0])
def test_a_layer_as_the_sum_of_all_its_echoes(detuning):
    # r = r1 + t1 t1' r2 e + t1 t1' r2 (-r1 r2) e^2 + ...: the series, term by term.
    n, layer = 1.52, 1.38
    r1, r2 = (1 - layer) / (1 + layer), (layer - n) / (layer + n)
    turn = complex(math.cos(math.pi * detuning), math.sin(math.pi * detuning))
    r, echo = complex(r1), (1 - r1 * r1) * r2 * turn
    for _ in range(20):  # each is weaker by r1 r2 = 0.008
        r += echo
        echo *= -r1 * r2 * turn
    assert quarter_wave_reflectance(n, layer, detuning) == pytest.approx(abs(r) ** 2, abs=1e-15)
