"""From a method's reference Schmidt number to that of this gas in this water."""

import numpy as np

from service.physics.declare import Array, Remark, derived, same_as, step

NEGATIVE = Remark(
    "the fit gives a negative transfer velocity here, which is set to 0",
    ("transfer_velocity_at_reference",),
    lambda k: k < 0.0,
)


@step("transfer_velocity_without_rain", formula="k = k_ref (Sc/Sc_ref)^-n")
def transfer_velocity(
    transfer_velocity_at_reference: Array,
    reference_schmidt_number: Array,
    schmidt_exponent: Array,
    schmidt_number: Array,
) -> Array:
    """Return the transfer velocity at a Schmidt number, from the one at a method's reference.

    Parameters
    ----------
    transfer_velocity_at_reference : (...) array
        [cm h-1]
    reference_schmidt_number : (...) array
        [1]
    schmidt_exponent : (...) array
        n, positive. [1]
    schmidt_number : (...) array
        [1]

    Returns
    -------
    (...) array
        [cm h-1]
    """
    return transfer_velocity_at_reference * (schmidt_number / reference_schmidt_number) ** -schmidt_exponent


def never_negative(
    transfer_velocity_at_reference: Array,
    reference_schmidt_number: Array,
    schmidt_exponent: Array,
    schmidt_number: Array,
) -> Array:
    """Return the transfer velocity at a Schmidt number, 0 where a fit falls below that.

    Parameters
    ----------
    transfer_velocity_at_reference : (...) array
        [cm h-1]
    reference_schmidt_number : (...) array
        [1]
    schmidt_exponent : (...) array
        n, positive. [1]
    schmidt_number : (...) array
        [1]

    Returns
    -------
    (...) array
        [cm h-1]
    """
    at_reference = np.maximum(transfer_velocity_at_reference, 0.0)
    return transfer_velocity(at_reference, reference_schmidt_number, schmidt_exponent, schmidt_number)


def set_negative_to_zero(*methods: str, gases: tuple[str, ...] = ()) -> None:
    """Declare that methods, of some gases only, whose fit can fall below zero give 0 there, and say so."""
    for method in methods:
        step(
            "transfer_velocity_without_rain",
            method=method,
            formula="k = max(k_ref, 0) (Sc/Sc_ref)^-n",
            remarks=(NEGATIVE,),
            gases=gases,
        )(never_negative)


def takes_no_rain(*methods: str) -> None:
    """Declare that rain is not added to what methods give."""
    for method in methods:
        same_as("transfer_velocity", "transfer_velocity_without_rain", method=method)


same_as("transfer_velocity", "transfer_velocity_without_rain")
derived("transfer_velocity_600", of="transfer_velocity", schmidt_number="schmidt_number_600")
derived("transfer_velocity_660", of="transfer_velocity", schmidt_number="schmidt_number_660")

# The caller's own transfer velocity takes the place of a method. In situ, its reference is the sample's own Schmidt
# number, also where the transfer velocity is asked at another one.
for _name, _reference in (
    ("given_transfer_velocity", "schmidt_number"),
    ("given_transfer_velocity_600", "schmidt_number_600"),
    ("given_transfer_velocity_660", "schmidt_number_660"),
):
    same_as("transfer_velocity_at_reference", _name, method="given", way=_name)
    same_as("reference_schmidt_number", _reference, method="given", way=_name, in_situ=True)

takes_no_rain("given")
