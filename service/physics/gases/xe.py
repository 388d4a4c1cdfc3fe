"""Xenon."""

from service.physics.declare import Block, Gas, gas
from service.physics.schmidt_number.diffusivity import Arrhenius, MolarVolume
from service.physics.solubility.forms import MoistAir

XE = gas(
    Gas(
        name="xe",
        formula="Xe",
        title="xenon",
        molar_mass=131.293,
        defaults={
            "solubility": "jenkins-2019",
            "schmidt_number": "viscosity-over-diffusivity",
            "diffusivity_in_fresh_water": "jahne-1987",
        },
        constants={"storage_ratio": 1.0},
        dry_air="0.087e-6",
        caution="An anaesthetic, denser than air: displaces oxygen in pits and holds.",
        blocks=(
            Block(
                "solubility",
                "jenkins-2019",
                MoistAir(
                    A1=-224.5100,
                    A2=292.8234,
                    A3=157.6127,
                    A4=-22.66895,
                    B1=-0.084915,
                    B2=0.047996,
                    B3=-0.0073595,
                    C1=6.69292e-6,
                    mole_fraction=0.087e-6,
                    moles=1.0,
                ),
                printed_in="Table 4, mol kg-1; from memory",
                supplies={"air_mole_fraction": 0.087},
            ),
            Block(
                "diffusivity_in_fresh_water",
                "jahne-1987",
                Arrhenius(A=9007e-5, activation_energy=21.61),
                printed_in="Table 4; from memory",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "wilke-chang-1955",
                MolarVolume(at_boiling_point=44.6),
                printed_in="molar volume: liquid at the boiling point by the reference equation of state of the fluid",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "hayduk-laudie-1974",
                MolarVolume(at_boiling_point=44.6),
                printed_in="molar volume: liquid at the boiling point by the reference equation of state of the fluid",
            ),
        ),
    )
)
