"""The Schmidt number from first principles, for any gas, salinity and temperature."""

from service.physics import sources
from service.physics.declare import Array, step


@step(
    "schmidt_number",
    method="viscosity-over-diffusivity",
    source=sources.WANNINKHOF_1992,
    equation="Appendix, the definition",
    formula="Sc = nu / D",
)
def viscosity_over_diffusivity(kinematic_viscosity: Array, diffusivity: Array) -> Array:
    """Return the Schmidt number as viscosity over diffusivity.

    Parameters
    ----------
    kinematic_viscosity : (...) array
        Of this water. [m2 s-1]
    diffusivity : (...) array
        Of the gas in this water. [m2 s-1]

    Returns
    -------
    (...) array
        [1]

    Notes
    -----
    Ranges and uncertainty are those of the two numbers. NaN in, NaN out.

    References
    ----------
    Wanninkhof (1992), Appendix. doi:10.1029/92JC00188
    """
    return kinematic_viscosity / diffusivity
