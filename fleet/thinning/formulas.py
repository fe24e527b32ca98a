"""Formulas of thinning: rates, errors, life, interval and projection."""

from __future__ import annotations

from fleet.formula import Num, formula, maximum, minimum, sqrt, square, where

_API = "API 510, Pressure Vessel Inspection Code"
_EDITION = "10th edition numbering"
_STATISTICS = "error propagation for independent readings"


@formula(
    gives="C", unit="mm/year", clause="7.1.1", standard=_API, edition=_EDITION, status="secondary",
    source="public worksheet quoting the 10th edition; the same form was read in API 570, 5th edition, 7.1.2",
)  # fmt: skip
def loss_rate(*, t_1: Num, t_2: Num, Y: Num) -> Num:
    """Give the loss per year between two observations of one location.

    Parameters
    ----------
    t_1 : float or array
        Earlier wall [mm].
    t_2 : float or array
        Later wall [mm].
    Y : float or array
        Time between them that counts [year].

    Returns
    -------
    float or array
        Loss rate [mm/year].

    Notes
    -----
    ``C = (t_1 - t_2) / Y``. Long-term from the first observation of the present history, short-term from the one
    before last.

    References
    ----------
    API 510, 10th edition, 7.1.1 (secondary).

    Examples
    --------
    >>> loss_rate(t_1=12.5, t_2=11.9, Y=6.0)
    0.09999999999999994
    """
    return (t_1 - t_2) / Y


@formula(
    gives="C_m", unit="mm/year", clause="-", standard=_STATISTICS, edition="-", status="ours",
    source="one-sided 95 % point of the normal distribution, 1.645, on the difference of two readings",
)  # fmt: skip
def least_measurable_rate(*, s_1: Num, s_2: Num, Y: Num) -> Num:
    """Give the smallest loss rate that two readings can show.

    Parameters
    ----------
    s_1 : float or array
        Error of the earlier reading, one standard deviation [mm].
    s_2 : float or array
        Error of the later reading [mm].
    Y : float or array
        Time between them that counts [year].

    Returns
    -------
    float or array
        Least measurable rate [mm/year].

    Notes
    -----
    ``1.645·√(s_1² + s_2²) / Y``; with equal errors ``1.645·√2·s / Y``. One-sided, 95 %.

    Examples
    --------
    >>> round(least_measurable_rate(s_1=0.25, s_2=0.25, Y=5.0), 2)
    0.12
    """
    return 1.645 * sqrt(square(s_1) + square(s_2)) / Y


@formula(
    gives="g", unit="mm", clause="-", standard=_STATISTICS, edition="-", status="ours",
    source="three standard deviations of the difference of two readings",
)  # fmt: skip
def noticeable_change(*, s_1: Num, s_2: Num) -> Num:
    """Give the change between two readings that their error does not explain.

    Parameters
    ----------
    s_1 : float or array
        Error of the earlier reading, one standard deviation [mm].
    s_2 : float or array
        Error of the later reading [mm].

    Returns
    -------
    float or array
        Change [mm].

    Notes
    -----
    ``3·√(s_1² + s_2²)``; with equal errors ``3·√2·s``. The threshold is a choice of this project: no public standard
    gives one.

    Examples
    --------
    >>> round(noticeable_change(s_1=0.25, s_2=0.25), 4)
    1.0607
    """
    return 3 * sqrt(square(s_1) + square(s_2))


@formula(
    gives="e", unit="mm/year", clause="-", standard=_STATISTICS, edition="-", status="ours",
    source="the short-term and the long-term rate share the last reading, and the difference takes that in",
)  # fmt: skip
def rate_difference_error(*, s: Num, d: Num, D: Num) -> Num:
    """Give the standard error of short-term less long-term rate.

    Parameters
    ----------
    s : float or array
        Error of a reading, one standard deviation [mm].
    d : float or array
        Short span [year].
    D : float or array
        Long span [year].

    Returns
    -------
    float or array
        Standard error [mm/year].

    Notes
    -----
    ``s·√(1/d² + 1/D² + (1/d - 1/D)²)``.

    Examples
    --------
    >>> round(rate_difference_error(s=0.25, d=2.0, D=10.0), 4)
    0.162
    """
    return s * sqrt(1 / square(d) + 1 / square(D) + square(1 / d - 1 / D))


@formula(
    gives="RL", unit="year", clause="7.2.1", standard=_API, edition=_EDITION, status="secondary",
    source="public worksheet and question bank; the same form was read in API 570, 5th edition, 7.2",
)  # fmt: skip
def remaining_life(*, t: Num, t_r: Num, C: Num) -> Num:
    """Give the remaining life of a wall, counted from its last observation.

    Parameters
    ----------
    t : float or array
        Wall in strength [mm].
    t_r : float or array
        Required thickness [mm].
    C : float or array
        Planning rate [mm/year].

    Returns
    -------
    float or array
        Remaining life; 0 at or below the required thickness [year].

    Notes
    -----
    ``RL = (t - t_r) / C``, never negative.

    References
    ----------
    API 510, 10th edition, 7.2.1 (secondary).

    Examples
    --------
    >>> remaining_life(t=12.0, t_r=10.0, C=0.25)
    8.0
    >>> remaining_life(t=9.0, t_r=10.0, C=0.25)
    0.0
    """
    return maximum(t - t_r, 0) / C


@formula(
    gives="I", unit="year", clause="6.5.1.1", standard=_API, edition=_EDITION, status="secondary",
    source="training material, worksheet and question banks",
)  # fmt: skip
def life_interval(*, RL: Num, f: Num, a: Num, b: Num) -> Num:
    """Give the interval that the remaining life allows, before the cap.

    Parameters
    ----------
    RL : float or array
        Remaining life [year].
    f : float or array
        Part of the life that may be used, one half [-].
    a : float or array
        Life below which the short-life rule holds, four years [year].
    b : float or array
        Longest interval under the short-life rule, two years [year].

    Returns
    -------
    float or array
        Interval [year].

    Notes
    -----
    Half the life; below four years the full life, at most two years.

    References
    ----------
    API 510, 10th edition, 6.5.1.1 (secondary).

    Examples
    --------
    >>> [life_interval(RL=life, f=0.5, a=4.0, b=2.0) for life in (12.0, 4.0, 3.0, 1.5)]
    [6.0, 2.0, 2.0, 1.5]
    """
    return where(RL < a, minimum(RL, b), f * RL)


@formula(
    gives="t_p", unit="mm", clause="7.3.3", standard=_API, edition=_EDITION, status="secondary",
    source="training material; the same rule was read in API 570, 5th edition, 7.5",
)  # fmt: skip
def projected_wall(*, t: Num, n: Num, C: Num, Y: Num) -> Num:
    """Give the wall after some years at the planning rate.

    Parameters
    ----------
    t : float or array
        Wall in strength at the last observation [mm].
    n : float or array
        Loss factor: 2 for the rated pressure by the in-service codes, 1 for the wall as such [-].
    C : float or array
        Planning rate [mm/year].
    Y : float or array
        Years that count from the last observation [year].

    Returns
    -------
    float or array
        Projected wall, never below zero [mm].

    Notes
    -----
    ``t_p = t - n·C·Y``, never negative.

    References
    ----------
    API 510, 10th edition, 7.3.3 (secondary).

    Examples
    --------
    >>> projected_wall(t=12.0, n=2.0, C=0.125, Y=4.0)
    11.0
    """
    return maximum(t - n * C * Y, 0)


AT_REQUIRED_ERRORS = 1.645
"""A wall less than this many reading errors above required counts as at required (one-sided 95 %). Status: ours."""
