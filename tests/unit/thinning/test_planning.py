"""Pure sums of the planning rate that are easier to see without a vessel."""

from __future__ import annotations

import math

import numpy as np
import pytest

from fleet.thinning.formulas import (
    AT_REQUIRED_ERRORS,
    least_measurable_rate,
    loss_rate,
    noticeable_change,
    projected_wall,
    rate_difference_error,
    remaining_life,
)


def test_rule_1_4_what_is_noticeable_is_three_errors_of_a_difference() -> None:
    assert noticeable_change(s_1=0.25, s_2=0.25) == pytest.approx(3 * math.sqrt(2) * 0.25)
    assert noticeable_change(s_1=0.3, s_2=0.4) == pytest.approx(1.5)


def test_rule_3_4_the_least_measurable_rate_is_one_sided_95_per_cent() -> None:
    # the 95 % point of the normal distribution is 1.644854; tables print 1.645
    assert least_measurable_rate(s_1=0.25, s_2=0.25, Y=5.0) == pytest.approx(1.645 * math.sqrt(2) * 0.05)
    assert AT_REQUIRED_ERRORS == 1.645


def test_rule_3_17_the_difference_of_two_rates_that_share_the_last_reading() -> None:
    # exactly: short (a - c)/4, long (b - c)/16: the variances of a/4, b/16 and c·(1/4 - 1/16) add
    variance = 0.25**2 * (1 / 16 + 1 / 256 + 9 / 256)
    assert rate_difference_error(s=0.25, d=4.0, D=16.0) == pytest.approx(math.sqrt(variance))


def test_rule_3_17_the_error_agrees_with_drawing_readings_at_random() -> None:
    draw = np.random.default_rng(7)
    a, b, c = draw.normal(0.0, 0.25, (3, 400_000))
    spread = float(np.std((a - c) / 2.0 - (b - c) / 10.0))
    # the spread of 400,000 draws is known to 1 part in √(2·400,000), 0.11 %; four of these
    assert rate_difference_error(s=0.25, d=2.0, D=10.0) == pytest.approx(spread, rel=0.0045)


def test_rule_3_1_a_rate_is_a_loss_over_years() -> None:
    assert loss_rate(t_1=12.5, t_2=11.5, Y=4.0) == 0.25


def test_rule_0_5_life_and_projected_wall_are_never_negative() -> None:
    assert remaining_life(t=9.0, t_r=10.0, C=0.5) == 0.0
    assert remaining_life(t=10.0, t_r=10.0, C=0.5) == 0.0
    assert projected_wall(t=1.0, n=2.0, C=0.5, Y=4.0) == 0.0
