"""Both currents of a pair of devices: what is left of the idle current in the one that lets go."""

import numpy as np
import pytest

from safeamp.physics import stage


@pytest.mark.parametrize("load", [0.0, 1e-3, 0.1, -0.1, 1.0, 5.0])
@pytest.mark.parametrize("idle", [0.01, 0.1, 1.0])
def test_product_of_junction_currents(load, idle):
    # Derived: without resistors both junctions share one bias, so i1*i2 = Iq**2, and i1 - i2 is the load's current.
    larger, smaller = stage.device_currents(
        load_current=load, idle_current=idle, emitter_resistor=0.0, law=stage.Law.BIPOLAR
    )
    assert larger == pytest.approx((abs(load) + np.hypot(load, 2.0 * idle)) / 2.0, rel=1e-6)
    assert larger * smaller == pytest.approx(idle**2, rel=1e-6)


def test_class_b_leaves_nothing_in_the_other_device():
    larger, smaller = stage.device_currents(
        load_current=[2.0, -3.0], idle_current=0.0, emitter_resistor=0.22, law=stage.Law.BIPOLAR
    )
    assert list(larger) == [2.0, 3.0]
    assert list(smaller) == [0.0, 0.0]


def test_refuses_a_negative_idle_current():
    with pytest.raises(ValueError, match=r"^idle_current must be zero or more, got -0\.1$"):
        stage.device_currents(
            load_current=1.0, idle_current=-0.1, emitter_resistor=0.22, law=stage.Law.BIPOLAR
        )
