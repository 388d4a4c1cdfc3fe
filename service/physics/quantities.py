"""The quantities: what each address answers. Names only; the steps are found from them."""

from importlib import import_module
from pkgutil import iter_modules
from types import ModuleType

import service.physics.air_side
import service.physics.enhancement
import service.physics.equilibration
import service.physics.equilibrator
import service.physics.flux
import service.physics.instrument_terms
import service.physics.interface
import service.physics.seawater
import service.physics.series_terms
import service.physics.sides
import service.physics.terms
import service.physics.transfer_terms
import service.physics.true_wind
import service.physics.turnover
import service.physics.wind
import service.physics.wind_memory
import service.physics.wind_moments
import service.physics.wind_profiles  # noqa: F401  imported for what they declare
from service.physics import carbonate, gases, schmidt_number, solubility, transfer_velocity
from service.physics.declare import Quantity, quantity


def _load_all(package: ModuleType) -> None:
    """Import every module of a package, so that a new file there is known without being named here."""
    for module in iter_modules(package.__path__, f"{package.__name__}."):
        import_module(module.name)


for _package in (solubility, schmidt_number, transfer_velocity, carbonate, gases):
    _load_all(_package)

TRANSFER = ("transfer_velocity", "transfer_velocity_600", "transfer_velocity_660")

SOLUBILITY = quantity(
    Quantity(
        "solubility",
        "Solubility in every form the trade uses, and the equilibrium concentration",
        results=(
            "solubility",
            "bunsen_coefficient",
            "ostwald_coefficient",
            "henry_constant",
            "equilibrium_concentration",
            "water_vapour_pressure",
        ),
        more=("fugacity_coefficient", "density"),
        needs_side={"equilibrium_concentration": "air_side", "fugacity_coefficient": "air_side"},
    )
)

SCHMIDT_NUMBER = quantity(
    Quantity(
        "schmidt-number",
        "Schmidt number of the gas in this water",
        results=("schmidt_number",),
        more=("kinematic_viscosity", "diffusivity", "diffusivity_in_fresh_water"),
    )
)

TRANSFER_VELOCITY = quantity(
    Quantity(
        "transfer-velocity",
        "Gas transfer (piston) velocity",
        results=(*TRANSFER, "schmidt_number", "wind_speed_10m"),
        more=("friction_velocity_air", "total_transfer_velocity", "steady_state_supersaturation"),
        needs_side={"wind_speed_10m": "wind_speed"},
    )
)

FLUX = quantity(
    Quantity(
        "flux",
        "Flux of the gas through the water surface, with every intermediate",
        results=(
            "flux",
            "evasion",
            "invasion",
            "transfer_velocity",
            "schmidt_number",
            "wind_speed_10m",
            "solubility",
            "fugacity_in_water",
            "fugacity_in_air",
            "fugacity_difference",
        ),
        more=(
            "concentration_in_water",
            "equilibrium_concentration",
            "saturation",
            "total_transfer_velocity",
            "transfer_velocity_600",
            "transfer_velocity_660",
            "open_water_fraction",
            "surface_pressure",
            "water_vapour_pressure",
            "friction_velocity_air",
            "density",
            "bubble_injection",
            "steady_state_supersaturation",
            "revelle_factor",
        ),
        needs_side={"wind_speed_10m": "wind_speed"},
        units={"solubility": "mol L-1 atm-1"},
        summaries=("flux", "evasion", "invasion"),
    )
)

EQUILIBRATION = quantity(
    Quantity(
        "equilibration",
        "Time in which a mixed layer comes into equilibrium with the air",
        results=(
            "equilibration_time",
            "half_time",
            "time_to_fraction",
            "storage_ratio",
            "transfer_velocity",
            "disequilibrium",
        ),
        more=(
            "equilibration_rate",
            "turnover_one_way",
            "turnover_net",
            "gas_stock",
            "total_transfer_velocity",
            "schmidt_number",
            "wind_speed_10m",
            "revelle_factor",
        ),
        needs_side={"disequilibrium": "course"},
    )
)

WIND_MEMORY = quantity(
    Quantity(
        "wind-memory",
        "Transfer velocity that the gas in a mixed layer remembers, from a series of winds",
        results=("weighted_transfer_velocity", "ventilated_fraction"),
        more=("memory_length", "transfer_velocity", "total_transfer_velocity", "schmidt_number", "wind_speed_10m"),
        series=True,
    )
)

TRUE_WIND = quantity(
    Quantity(
        "true-wind",
        "True wind from the wind felt on a moving ship",
        results=("true_wind_speed", "true_wind_direction", "wind_speed_over_water", "wind_direction_over_water"),
        more=("true_wind_eastward", "true_wind_northward"),
        needs_side={"wind_speed_over_water": "current", "wind_direction_over_water": "current"},
        of_gas=False,
    )
)
