"""Radon 222."""

from service.physics.declare import Block, Gas, gas
from service.physics.schmidt_number.diffusivity import Arrhenius
from service.physics.schmidt_number.polynomials import Rows
from service.physics.solubility.forms import Weiss

RN222 = gas(
    Gas(
        name="rn222",
        formula="Rn",
        title="radon 222",
        molar_mass=222.018,
        defaults={
            "solubility": "schubert-2012",
            "schmidt_number": "wanninkhof-2014",
            "diffusivity_in_fresh_water": "jahne-1987",
        },
        constants={"storage_ratio": 1.0, "decay_constant": 2.098e-6},
        dry_air="next to nothing over the open sea; over land give it",
        caution="Radioactive, and its daughters lodge in the lungs: air rooms where water rich in radon is degassed.",
        blocks=(
            Block(
                "solubility_per_litre",
                "schubert-2012",
                Weiss(A1=-76.14, A2=120.36, A3=31.26, B1=-0.2631, B2=0.1673, B3=-0.0270),
                printed_in="the fit of the Bunsen coefficient",
                note="Some copies print B3 as -0.0273.",
            ),
            Block(
                "schmidt_number",
                "wanninkhof-2014",
                Rows(
                    sea=(3489.6, -244.56, 8.9713, -0.18022, 0.0014985),
                    fresh=(3171, -224.28, 8.2809, -0.16699, 0.0013915),
                ),
                printed_in="Table 1; from memory",
            ),
            Block(
                "schmidt_number",
                "wanninkhof-1992",
                Rows(sea=(3412.8, -224.30, 6.7954, -0.08300), fresh=(3146.1, -210.48, 6.4486, -0.079135)),
                printed_in="Table A1; from memory, confirmed in part by viscosity over diffusivity",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "jahne-1987",
                Arrhenius(A=15877e-5, activation_energy=23.26),
                printed_in="Table 4; from memory",
            ),
        ),
    )
)
