"""From a method's reference Schmidt number to that of this gas in this water."""

from service.physics.declare import Array, derived, same_as, step


@step("transfer_velocity", formula="k = k_ref (Sc/Sc_ref)^-n")
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
