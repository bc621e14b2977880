"""Cross-sections: round and ring behave alike."""

import math

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.sizing.section import Section

SECTIONS = st.builds(
    Section, cans=st.integers(1, 16), mean_diameter=st.one_of(st.none(), st.floats(0.1, 2.0))
)


@settings(derandomize=True, max_examples=50)
@given(section=SECTIONS, height=st.floats(0.02, 1.0))
def test_height_and_area_are_inverse(section, height):
    assert section.height(section.area(height)) == pytest.approx(height)


def test_round_section_is_a_circle():
    section = Section(cans=3)
    assert section.area(0.2) == pytest.approx(3 * math.pi * 0.01)
    assert section.perimeter(0.2) == pytest.approx(math.pi * 0.2)
    assert section.hydraulic_diameter(0.2) == pytest.approx(0.2)


def test_ring_section_is_an_annulus():
    """Outer 0.55 m, inner 0.45 m."""
    section = Section(mean_diameter=0.5)
    assert section.area(0.05) == pytest.approx(math.pi / 4 * (0.55**2 - 0.45**2))
    assert section.hydraulic_diameter(0.05) == pytest.approx(2 * 0.05)
