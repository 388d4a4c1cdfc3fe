"""Krypton."""

from service.physics.declare import Block, Gas, gas
from service.physics.schmidt_number.diffusivity import Arrhenius, MolarVolume
from service.physics.schmidt_number.polynomials import Rows
from service.physics.solubility.forms import MoistAir

WEISS_KYSER_MOLAR_VOLUME = 22.3511  # L mol-1 at 0 degC and 1 atm, in common use with the fit of Weiss and Kyser (1978)

KR = gas(
    Gas(
        name="kr",
        formula="Kr",
        title="krypton",
        molar_mass=83.798,
        defaults={
            "solubility": "jenkins-2019",
            "schmidt_number": "wanninkhof-1992",
            "diffusivity_in_fresh_water": "jahne-1987",
        },
        constants={"storage_ratio": 1.0, "molar_volume_stp": WEISS_KYSER_MOLAR_VOLUME},
        dry_air="1.14e-6",
        caution="Denser than air: displaces oxygen in pits and holds.",
        blocks=(
            Block(
                "solubility",
                "jenkins-2019",
                MoistAir(
                    A1=-122.4694,
                    A2=153.5654,
                    A3=70.1969,
                    A4=-8.52524,
                    B1=-0.049522,
                    B2=0.024434,
                    B3=-0.0033968,
                    C1=4.19208e-6,
                    mole_fraction=1.14e-6,
                    moles=1.0,
                ),
                printed_in="Table 4, mol kg-1; from memory",
                supplies={"air_mole_fraction": 1.14},
            ),
            Block(
                "solubility",
                "weiss-kyser-1978",
                MoistAir(
                    A1=-112.6840,
                    A2=153.5817,
                    A3=74.4690,
                    A4=-10.0189,
                    B1=-0.011213,
                    B2=-0.001844,
                    B3=0.0011201,
                    mole_fraction=1.14e-6,
                    moles=1e-3 / WEISS_KYSER_MOLAR_VOLUME,
                ),
                printed_in="the equation for moist air, mL kg-1",
                supplies={"air_mole_fraction": 1.14},
                note="mole fraction of Glueckauf (1951)",
            ),
            Block(
                "schmidt_number",
                "wanninkhof-1992",
                Rows(sea=(2205.0, -135.71, 3.9549, -0.047339), fresh=(2032.7, -127.55, 3.7621, -0.045236)),
                printed_in="Table A1; from memory, confirmed in part by viscosity over diffusivity",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "jahne-1987",
                Arrhenius(A=6393e-5, activation_energy=20.20),
                printed_in="Table 4; from memory",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "wilke-chang-1955",
                MolarVolume(at_boiling_point=34.7),
                printed_in="molar volume: liquid at the boiling point by the reference equation of state of the fluid",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "hayduk-laudie-1974",
                MolarVolume(at_boiling_point=34.7),
                printed_in="molar volume: liquid at the boiling point by the reference equation of state of the fluid",
            ),
        ),
    )
)
