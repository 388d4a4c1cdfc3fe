"""Hydrogen."""

from service.physics.declare import Block, Gas, gas
from service.physics.schmidt_number.diffusivity import Arrhenius
from service.physics.solubility.forms import MoistAir

H2 = gas(
    Gas(
        name="h2",
        formula="H2",
        title="hydrogen",
        molar_mass=2.016,
        defaults={
            "solubility": "wiesenburg-guinasso-1979",
            "schmidt_number": "viscosity-over-diffusivity",
            "diffusivity_in_fresh_water": "jahne-1987",
        },
        constants={"storage_ratio": 1.0},
        dry_air="about 0.53e-6: give it",
        caution="Burns in air from 4 percent with an invisible flame; gathers under ceilings and in headspaces.",
        blocks=(
            Block(
                "solubility",
                "wiesenburg-guinasso-1979",
                MoistAir(
                    A1=-320.3079,
                    A2=459.7398,
                    A3=299.2600,
                    A4=-49.3946,
                    B1=-0.074474,
                    B2=0.043363,
                    B3=-0.0067420,
                    moles=1e-9,
                ),
                printed_in="Table VI, nmol kg-1; from memory",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "jahne-1987",
                Arrhenius(A=3338e-5, activation_energy=16.06),
                printed_in="Table 4; from memory",
            ),
        ),
    )
)
