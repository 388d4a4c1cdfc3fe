"""The part of the transfer velocity that rain makes, added to that of the wind or standing alone over still water."""

from service.physics import sources
from service.physics.declare import Array, Remark, step
from service.physics.polynomial import polynomial
from service.physics.transfer_velocity.reference import REFERENCE, SQUARE_ROOT, reference
from service.physics.transfer_velocity.scaling import takes_no_rain

HO_1997_STILL = 0.929  # cm h-1, without rain or wind; Ho et al. (1997)
HO_1997 = (0.0, 0.679, -0.0015)  # cm h-1 per power of mm h-1; Ho et al. (1997)
HO_1997_SCHMIDT = 600.0
RAIN_MEASURED = (0.0, 115.2)  # mm h-1, the highest rate of the experiment; from memory
FRESH = 1.0  # practical salinity up to which water counts as fresh: that of Ho et al. (1997) was
STRONG_WIND = 5.0  # m s-1, above which wind and rain are not known to add up

IN_SALT_WATER = Remark(
    "the effect of rain was measured on fresh water, and this is salt",
    ("rain_rate", "salinity"),
    lambda rain, S: (rain > 0.0) & (S > FRESH),
)
WITH_STRONG_WIND = Remark(
    f"rain is added to a wind over {STRONG_WIND:g} m s-1, where the two are not known to add up",
    ("rain_rate", "wind_speed_10m"),
    lambda rain, U: (rain > 0.0) & (U > STRONG_WIND),
)


@step(
    "transfer_velocity",
    way="rain_rate",
    source=sources.HO_1997,
    equation="relation between rain rate and k600, without its constant",
    formula="k = k(wind) + (0.679 R - 0.0015 R^2) (Sc/600)^-1/2",
    valid={"rain_rate": RAIN_MEASURED},
    range_kind="data",
    remarks=(IN_SALT_WATER, WITH_STRONG_WIND),
)
def with_rain(transfer_velocity_without_rain: Array, schmidt_number: Array, rain_rate: Array) -> Array:
    """Return the transfer velocity with what rain adds to it, after Ho et al. (1997).

    Parameters
    ----------
    transfer_velocity_without_rain : (...) array
        [cm h-1]
    schmidt_number : (...) array
        [1]
    rain_rate : (...) array
        [mm h-1]

    Returns
    -------
    (...) array
        [cm h-1]

    Notes
    -----
    The still-water constant of the relation stays out, since the wind's own k holds it. That the two add up is common
    practice at weak winds.

    References
    ----------
    Ho et al. (1997).
    """
    by_rain = polynomial(HO_1997, rain_rate) * (schmidt_number / HO_1997_SCHMIDT) ** -SQUARE_ROOT
    return transfer_velocity_without_rain + by_rain


@step(
    REFERENCE,
    method="ho-1997",
    source=sources.HO_1997,
    equation="relation between rain rate and k600",
    formula="k600 = 0.929 + 0.679 R - 0.0015 R^2",
    supplies=reference(HO_1997_SCHMIDT),
    valid={"rain_rate": RAIN_MEASURED},
    range_kind="data",
    water=("lake",),
    in_all=False,
    remarks=(IN_SALT_WATER,),
    note="Rain on still fresh water, without wind. With wind choose a method for that, and send rain_rate beside it.",
)
def ho_1997(rain_rate: Array) -> Array:
    """Return the transfer velocity of rain on still fresh water after Ho et al. (1997).

    Parameters
    ----------
    rain_rate : (...) array
        [mm h-1]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 600. [cm h-1]

    Notes
    -----
    ``k600 = 0.929 + 0.679 R - 0.0015 R^2``, measured up to about 115 mm h-1. NaN in, NaN out.

    References
    ----------
    Ho et al. (1997).
    """
    return HO_1997_STILL + polynomial(HO_1997, rain_rate)


takes_no_rain("ho-1997")
