"""Bromomethane."""

from service.physics.declare import Block, Gas, gas
from service.physics.schmidt_number.diffusivity import MolarVolume
from service.physics.schmidt_number.polynomials import SEA_ONLY, Rows
from service.physics.solubility.forms import Weiss

CH3BR = gas(
    Gas(
        name="ch3br",
        formula="CH3Br",
        title="bromomethane",
        molar_mass=94.939,
        defaults={
            "solubility": "de-bruyn-saltzman-1997",
            "schmidt_number": "viscosity-over-diffusivity",
            "diffusivity_in_fresh_water": "wilke-chang-1955",
            "air_side": "duce-1991",
        },
        constants={"storage_ratio": 1.0},
        dry_air="about 7e-12: give it",
        caution="Very toxic, with little smell as a warning; harms nerves and lungs, also hours later.",
        blocks=(
            Block(
                "solubility_per_litre",
                "de-bruyn-saltzman-1997",
                Weiss(A1=-171.2, A2=254.3, A3=77.04, B1=0.2591, B2=-0.1828, B3=0.03142),
                printed_in="K0, mol L-1 atm-1; from memory",
            ),
            Block(
                "schmidt_number",
                "wanninkhof-2014",
                Rows(sea=(2181.8, -138.4, 4.7663, -0.092448, 0.0007547), fresh=None),
                printed_in="Table 1; from memory",
                valid=SEA_ONLY,
                note="no fresh-water row could be had: not offered below salinity 35",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "wilke-chang-1955",
                MolarVolume(at_boiling_point=52.9),
                printed_in="molar volume: sum of Le Bas's atomic volumes as tabled there; from memory",
                note="The sea-water row of wanninkhof-2014, from a measured diffusivity, is 14 to 21 % lower.",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "hayduk-laudie-1974",
                MolarVolume(at_boiling_point=52.9),
                printed_in="molar volume: sum of Le Bas's atomic volumes as tabled there; from memory",
            ),
        ),
    )
)
