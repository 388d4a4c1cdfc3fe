"""Transfer velocities of streams, from their flow."""

from service.physics import sources
from service.physics.constants import METRES_PER_DAY
from service.physics.declare import Array, Uncertainty, relative_uncertainty, step
from service.physics.polynomial import polynomial
from service.physics.transfer_velocity.reference import REFERENCE, reference
from service.physics.transfer_velocity.scaling import set_negative_to_zero, takes_no_rain

GRAVITY_RAYMOND = 9.81  # m s-2, in the Froude number

# Raymond et al. (2012), Table 2, one set for each model; V flow velocity, S slope, D depth, Q discharge.


def fit_error(coefficient: float, error: float) -> Uncertainty:
    """Return the standard error of a leading coefficient as a relative uncertainty."""
    return relative_uncertainty(error / coefficient, "standard error of the fit", f"{coefficient:g} +- {error:g}")


RAYMOND_2012_1 = (5037.0, 0.89, 0.54)  # leading coefficient [m d-1], exponents of V S and of D


@step(
    REFERENCE,
    method="raymond-2012-1",
    source=sources.RAYMOND_2012,
    equation="Table 2, model 1",
    formula="k600 = 5037 (V S)^0.89 D^0.54, in m d-1",
    supplies=reference(600.0),
    uncertainty=fit_error(5037.0, 604.0),
    water=("stream",),
    variant_of="raymond-2012-5",
)
def raymond_2012_one(flow_velocity: Array, slope: Array, water_depth: Array) -> Array:
    """Return the transfer velocity of a stream by model 1 of Raymond et al. (2012): stream power and depth.

    Parameters
    ----------
    flow_velocity : (...) array
        [m s-1]
    slope : (...) array
        Of the bed, fall over length. [1]
    water_depth : (...) array
        Mean over the reach. [m]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 600. [cm h-1]

    Notes
    -----
    ``k600 = 5037 (V S)^0.89 D^0.54, in m d-1``. NaN in, NaN out.

    References
    ----------
    Raymond et al. (2012), Table 2. doi:10.1215/21573689-1597669
    """
    coefficient, of_power, of_depth = RAYMOND_2012_1
    k = coefficient * (flow_velocity * slope) ** of_power * water_depth**of_depth
    return k / METRES_PER_DAY


RAYMOND_2012_2 = (5937.0, 2.54, 0.89, 0.58)  # leading coefficient [m d-1], that of Fr^2, exponents of V S and of D


@step(
    REFERENCE,
    method="raymond-2012-2",
    source=sources.RAYMOND_2012,
    equation="Table 2, model 2",
    formula="k600 = 5937 (1 - 2.54 Fr^2) (V S)^0.89 D^0.58, Fr = V/(g D)^0.5, in m d-1",
    supplies=reference(600.0),
    uncertainty=fit_error(5937.0, 606.0),
    water=("stream",),
    variant_of="raymond-2012-5",
)
def raymond_2012_two(flow_velocity: Array, slope: Array, water_depth: Array) -> Array:
    """Return the transfer velocity of a stream by model 2 of Raymond et al. (2012), with the Froude number.

    Parameters
    ----------
    flow_velocity : (...) array
        [m s-1]
    slope : (...) array
        Of the bed, fall over length. [1]
    water_depth : (...) array
        Mean over the reach. [m]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 600. [cm h-1]

    Notes
    -----
    ``k600 = 5937 (1 - 2.54 Fr^2) (V S)^0.89 D^0.58, Fr = V/(g D)^0.5, in m d-1``. Negative where Fr is over
    0.63. NaN in, NaN out.

    References
    ----------
    Raymond et al. (2012), Table 2. doi:10.1215/21573689-1597669
    """
    coefficient, of_froude, of_power, of_depth = RAYMOND_2012_2
    froude_squared = flow_velocity**2 / (GRAVITY_RAYMOND * water_depth)
    k = coefficient * (flow_velocity * slope) ** of_power * water_depth**of_depth
    k = k * (1.0 - of_froude * froude_squared)
    return k / METRES_PER_DAY


RAYMOND_2012_3 = (1162.0, 0.77, 0.85)  # leading coefficient [m d-1], exponents of S and of V


@step(
    REFERENCE,
    method="raymond-2012-3",
    source=sources.RAYMOND_2012,
    equation="Table 2, model 3",
    formula="k600 = 1162 S^0.77 V^0.85, in m d-1",
    supplies=reference(600.0),
    uncertainty=fit_error(1162.0, 192.0),
    water=("stream",),
    variant_of="raymond-2012-5",
)
def raymond_2012_three(flow_velocity: Array, slope: Array) -> Array:
    """Return the transfer velocity of a stream by model 3 of Raymond et al. (2012): slope and velocity.

    Parameters
    ----------
    flow_velocity : (...) array
        [m s-1]
    slope : (...) array
        Of the bed, fall over length. [1]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 600. [cm h-1]

    Notes
    -----
    ``k600 = 1162 S^0.77 V^0.85, in m d-1``. NaN in, NaN out.

    References
    ----------
    Raymond et al. (2012), Table 2. doi:10.1215/21573689-1597669
    """
    coefficient, of_slope, of_velocity = RAYMOND_2012_3
    k = coefficient * slope**of_slope * flow_velocity**of_velocity
    return k / METRES_PER_DAY


RAYMOND_2012_4 = (951.5, 0.76)  # leading coefficient [m d-1], exponent of V S


@step(
    REFERENCE,
    method="raymond-2012-4",
    source=sources.RAYMOND_2012,
    equation="Table 2, model 4",
    formula="k600 = 951.5 (V S)^0.76, in m d-1",
    supplies=reference(600.0),
    uncertainty=fit_error(951.5, 144.0),
    water=("stream",),
    variant_of="raymond-2012-5",
)
def raymond_2012_four(flow_velocity: Array, slope: Array) -> Array:
    """Return the transfer velocity of a stream by model 4 of Raymond et al. (2012): a power of stream power.

    Parameters
    ----------
    flow_velocity : (...) array
        [m s-1]
    slope : (...) array
        Of the bed, fall over length. [1]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 600. [cm h-1]

    Notes
    -----
    ``k600 = 951.5 (V S)^0.76, in m d-1``. NaN in, NaN out.

    References
    ----------
    Raymond et al. (2012), Table 2. doi:10.1215/21573689-1597669
    """
    coefficient, of_power = RAYMOND_2012_4
    k = coefficient * (flow_velocity * slope) ** of_power
    return k / METRES_PER_DAY


RAYMOND_2012_5 = (2.02, 2841.0)  # constant [m d-1] and slope with V S


@step(
    REFERENCE,
    method="raymond-2012-5",
    source=sources.RAYMOND_2012,
    equation="Table 2, model 5",
    formula="k600 = 2841 V S + 2.02, in m d-1",
    supplies=reference(600.0),
    water=("stream",),
    note="Standard errors of the coefficients: 107 and 0.209. The one of the seven that needs least.",
)
def raymond_2012_five(flow_velocity: Array, slope: Array) -> Array:
    """Return the transfer velocity of a stream by model 5 of Raymond et al. (2012): stream power, linear.

    Parameters
    ----------
    flow_velocity : (...) array
        [m s-1]
    slope : (...) array
        Of the bed, fall over length. [1]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 600. [cm h-1]

    Notes
    -----
    ``k600 = 2841 V S + 2.02, in m d-1``. NaN in, NaN out.

    References
    ----------
    Raymond et al. (2012), Table 2. doi:10.1215/21573689-1597669
    """
    k = polynomial(RAYMOND_2012_5, flow_velocity * slope)
    return k / METRES_PER_DAY


RAYMOND_2012_6 = (929.0, 0.75, 0.011)  # leading coefficient [m d-1], exponents of V S and of Q


@step(
    REFERENCE,
    method="raymond-2012-6",
    source=sources.RAYMOND_2012,
    equation="Table 2, model 6",
    formula="k600 = 929 (V S)^0.75 Q^0.011, in m d-1",
    supplies=reference(600.0),
    uncertainty=fit_error(929.0, 141.0),
    water=("stream",),
    variant_of="raymond-2012-5",
)
def raymond_2012_six(flow_velocity: Array, slope: Array, discharge: Array) -> Array:
    """Return the transfer velocity of a stream by model 6 of Raymond et al. (2012): stream power and discharge.

    Parameters
    ----------
    flow_velocity : (...) array
        [m s-1]
    slope : (...) array
        Of the bed, fall over length. [1]
    discharge : (...) array
        [m3 s-1]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 600. [cm h-1]

    Notes
    -----
    ``k600 = 929 (V S)^0.75 Q^0.011, in m d-1``. NaN in, NaN out.

    References
    ----------
    Raymond et al. (2012), Table 2. doi:10.1215/21573689-1597669
    """
    coefficient, of_power, of_discharge = RAYMOND_2012_6
    k = coefficient * (flow_velocity * slope) ** of_power * discharge**of_discharge
    return k / METRES_PER_DAY


RAYMOND_2012_7 = (4725.0, 0.86, -0.14, 0.66)  # leading coefficient [m d-1], exponents of V S, of Q and of D


@step(
    REFERENCE,
    method="raymond-2012-7",
    source=sources.RAYMOND_2012,
    equation="Table 2, model 7",
    formula="k600 = 4725 (V S)^0.86 Q^-0.14 D^0.66, in m d-1",
    supplies=reference(600.0),
    uncertainty=fit_error(4725.0, 445.0),
    water=("stream",),
    variant_of="raymond-2012-5",
)
def raymond_2012_seven(flow_velocity: Array, slope: Array, water_depth: Array, discharge: Array) -> Array:
    """Return the transfer velocity of a stream by model 7 of Raymond et al. (2012): stream power, discharge and depth.

    Parameters
    ----------
    flow_velocity : (...) array
        [m s-1]
    slope : (...) array
        Of the bed, fall over length. [1]
    water_depth : (...) array
        Mean over the reach. [m]
    discharge : (...) array
        [m3 s-1]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 600. [cm h-1]

    Notes
    -----
    ``k600 = 4725 (V S)^0.86 Q^-0.14 D^0.66, in m d-1``. NaN in, NaN out.

    References
    ----------
    Raymond et al. (2012), Table 2. doi:10.1215/21573689-1597669
    """
    coefficient, of_power, of_discharge, of_depth = RAYMOND_2012_7
    k = coefficient * (flow_velocity * slope) ** of_power
    k = k * discharge**of_discharge * water_depth**of_depth
    return k / METRES_PER_DAY


set_negative_to_zero("raymond-2012-2")
takes_no_rain(*(f"raymond-2012-{_number}" for _number in range(1, 8)))
