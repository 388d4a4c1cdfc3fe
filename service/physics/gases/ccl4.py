"""Tetrachloromethane."""

from service.physics.declare import Block, Gas, gas
from service.physics.schmidt_number.diffusivity import MolarVolume
from service.physics.schmidt_number.polynomials import SEA_ONLY, Rows
from service.physics.solubility.forms import SolubilityFunction

CCL4 = gas(
    Gas(
        name="ccl4",
        formula="CCl4",
        title="tetrachloromethane",
        molar_mass=153.81,
        defaults={
            "solubility": "bullister-wisegarver-1998",
            "schmidt_number": "viscosity-over-diffusivity",
            "diffusivity_in_fresh_water": "wilke-chang-1955",
        },
        constants={"storage_ratio": 1.0},
        dry_air="falling: give it",
        caution="Poisons the liver, also through the skin, and may cause cancer: make up standards under a hood.",
        blocks=(
            Block(
                "solubility_per_litre",
                "bullister-wisegarver-1998",
                SolubilityFunction(
                    A1=-148.247,
                    A2=227.758,
                    A3=62.5557,
                    A4=0.0,
                    B1=-0.400847,
                    B2=0.265218,
                    B3=-0.0446424,
                ),
                printed_in="F, mol L-1 atm-1; from memory",
            ),
            Block(
                "schmidt_number",
                "wanninkhof-2014",
                Rows(sea=(4398.7, -308.25, 11.798, -0.24709, 0.0021159), fresh=None),
                printed_in="Table 1; from memory",
                valid=SEA_ONLY,
                note="no fresh-water row could be had: not offered below salinity 35",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "wilke-chang-1955",
                MolarVolume(at_boiling_point=101.2),
                printed_in="molar volume: sum of Le Bas's atomic volumes as tabled there; from memory",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "hayduk-laudie-1974",
                MolarVolume(at_boiling_point=101.2),
                printed_in="molar volume: sum of Le Bas's atomic volumes as tabled there; from memory",
            ),
        ),
    )
)
