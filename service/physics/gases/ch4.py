"""Methane."""

from service.physics.declare import Block, Gas, gas
from service.physics.schmidt_number.diffusivity import Arrhenius, MolarVolume
from service.physics.schmidt_number.polynomials import FRESH_ONLY, Rows
from service.physics.solubility.forms import MoistAir

CH4 = gas(
    Gas(
        name="ch4",
        formula="CH4",
        title="methane",
        molar_mass=16.043,
        element="C",
        element_mass=12.011,
        defaults={
            "solubility": "wiesenburg-guinasso-1979",
            "schmidt_number": "wanninkhof-2014",
            "diffusivity_in_fresh_water": "jahne-1987",
        },
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
                    moles=1e-9,
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
                    moles=1e-9,
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
            Block(
                "schmidt_number",
                "raymond-2012",
                Rows(sea=None, fresh=(1824, -98.12, 2.413, -0.0241)),
                printed_in="Table 1; from memory",
                valid=FRESH_ONLY,
            ),
            Block(
                "diffusivity_in_fresh_water",
                "jahne-1987",
                Arrhenius(A=3047e-5, activation_energy=18.36),
                printed_in="Table 4; from memory",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "wilke-chang-1955",
                MolarVolume(at_boiling_point=38.0),
                printed_in="molar volume: liquid at the boiling point by the reference equation of state of the fluid",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "hayduk-laudie-1974",
                MolarVolume(at_boiling_point=38.0),
                printed_in="molar volume: liquid at the boiling point by the reference equation of state of the fluid",
            ),
        ),
    )
)
