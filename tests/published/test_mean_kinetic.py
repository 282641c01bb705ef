"""Mean kinetic temperature by the formula of USP <1160>, with 83.144 kJ/mol: 10 000 K over the gas constant."""

import pytest

from app.physics.kinetic import mean_kinetic_c

SERIES = [
    # temperatures, durations, mean kinetic temperature: USP <1160> (computed; it prints no worked example)
    ([5.0, 25.0], [1.0, 1.0], 19.698),
    ([2.0, 8.0], [1.0, 1.0], 5.536),
    ([5.0, 15.0], [21.0, 3.0], 7.107),
    ([20.0, 30.0], [1.0, 1.0], 26.260),
    ([20.0, 25.0, 30.0], [1.0, 1.0, 1.0], 25.858),
    ([20.0, 40.0], [29.0 * 24.0, 24.0], 22.008),
]


@pytest.mark.parametrize(("temperatures_c", "durations_h", "expected_c"), SERIES)
def test_series(temperatures_c, durations_h, expected_c):
    assert mean_kinetic_c(temperatures_c, durations_h) == pytest.approx(expected_c, abs=0.0006)
