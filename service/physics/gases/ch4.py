"""Methane."""

from service.physics.declare import Block, Gas, gas
from service.physics.schmidt_number.polynomials import Rows
from service.physics.solubility.forms import MoistAir

CH4 = gas(
    Gas(
        name="ch4",
        formula="CH4",
        title="methane",
        molar_mass=16.043,
        element="C",
        element_mass=12.011,
        defaults={"solubility": "wiesenburg-guinasso-1979", "schmidt_number": "wanninkhof-2014"},
        constants={"storage_ratio": 1.0},
        dry_air="about 1.9e-6, rising: give it",
        caution="Burns in air from 4.4 percent and displaces oxygen; gathers under ice, decks and in headspaces.",
        blocks=(
            Block(
                "solubility",
                "wiesenburg-guinasso-1979",
                MoistAir(
                    A1=-417.5053,
                    A2=599.8626,
                    A3=380.3636,
                    A4=-62.0764,
                    B1=-0.064236,
                    B2=0.034980,
                    B3=-0.0052732,
                ),
                printed_in="Table VI, nmol kg-1; from memory",
            ),
            Block(
                "solubility_per_litre",
                "wiesenburg-guinasso-1979",
                MoistAir(
                    A1=-415.2807,
                    A2=596.8104,
                    A3=379.2599,
                    A4=-62.0757,
                    B1=-0.059160,
                    B2=0.032174,
                    B3=-0.0048198,
                ),
                printed_in="Table VI, nmol L-1",
            ),
            Block(
                "schmidt_number",
                "wanninkhof-2014",
                Rows(
                    sea=(2101.2, -131.54, 4.4931, -0.08676, 0.00070663),
                    fresh=(1909.4, -120.78, 4.1555, -0.080578, 0.00065777),
                ),
                printed_in="Table 1",
            ),
            Block(
                "schmidt_number",
                "wanninkhof-1992",
                Rows(sea=(2039.2, -120.31, 3.4209, -0.040437), fresh=(1897.8, -114.28, 3.2902, -0.039061)),
                printed_in="Table A1; from memory, confirmed in part by viscosity over diffusivity",
            ),
        ),
    )
)
