"""Neon."""

from service.physics.declare import Block, Gas, gas, relative_uncertainty
from service.physics.schmidt_number.diffusivity import Arrhenius
from service.physics.schmidt_number.polynomials import Rows
from service.physics.solubility.forms import MoistAir, ScaledTemperature

NE = gas(
    Gas(
        name="ne",
        formula="Ne",
        title="neon",
        molar_mass=20.1797,
        defaults={
            "solubility": "hamme-emerson-2004",
            "schmidt_number": "wanninkhof-1992",
            "diffusivity_in_fresh_water": "jahne-1987",
        },
        constants={"storage_ratio": 1.0},
        dry_air="18.18e-6",
        caution="Displaces oxygen in closed rooms.",
        blocks=(
            Block(
                "solubility",
                "hamme-emerson-2004",
                ScaledTemperature(
                    A=(2.18156, 1.29108, 2.12504),
                    B=(-5.94737e-3, -5.13896e-3),
                    C0=0.0,
                    mole_fraction=18.18e-6,
                    moles=1e-9,
                ),
                printed_in="Table 4, nmol kg-1",
                supplies={"air_mole_fraction": 18.18},
                uncertainty=relative_uncertainty(0.003, "author's estimate", "0.30 % (from memory)"),
            ),
            Block(
                "solubility",
                "jenkins-2019",
                MoistAir(
                    A1=-274.1329,
                    A2=352.6201,
                    A3=226.9676,
                    A4=-37.13393,
                    B1=-0.063860,
                    B2=0.035326,
                    B3=-0.0053258,
                    C1=1.28233e-5,
                    mole_fraction=18.18e-6,
                    moles=1.0,
                ),
                printed_in="Table 4, mol kg-1; from memory",
                supplies={"air_mole_fraction": 18.18},
            ),
            Block(
                "schmidt_number",
                "wanninkhof-1992",
                Rows(sea=(855.1, -46.299, 1.254, -0.01449), fresh=(764.0, -42.234, 1.1581, -0.013405)),
                printed_in="Table A1; from memory, confirmed in part by viscosity over diffusivity",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "jahne-1987",
                Arrhenius(A=1608e-5, activation_energy=14.84),
                printed_in="Table 4; from memory",
            ),
        ),
    )
)
