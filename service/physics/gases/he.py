"""Helium."""

from service.physics.declare import Block, Gas, gas
from service.physics.schmidt_number.diffusivity import Arrhenius
from service.physics.schmidt_number.polynomials import FRESH_ONLY, Rows
from service.physics.solubility.forms import MoistAir

# L mol-1 at 0 degC and 1 atm, in common use with the fit of Weiss (1971). The second virial coefficient of helium gives
# 22.426, 0.07 percent less.
WEISS_MOLAR_VOLUME = 22.44257

HE = gas(
    Gas(
        name="he",
        formula="He",
        title="helium",
        molar_mass=4.002602,
        defaults={
            "solubility": "jenkins-2019",
            "schmidt_number": "wanninkhof-1992",
            "diffusivity_in_fresh_water": "jahne-1987",
        },
        constants={"storage_ratio": 1.0, "molar_volume_stp": WEISS_MOLAR_VOLUME},
        dry_air="5.24e-6",
        caution="Displaces oxygen in closed rooms.",
        blocks=(
            Block(
                "solubility",
                "jenkins-2019",
                MoistAir(
                    A1=-178.1424,
                    A2=217.5991,
                    A3=140.7506,
                    A4=-23.01954,
                    B1=-0.038129,
                    B2=0.019190,
                    B3=-0.0026898,
                    C1=-2.55157e-6,
                    mole_fraction=5.24e-6,
                    moles=1.0,
                ),
                printed_in="Table 4, mol kg-1; from memory",
                supplies={"air_mole_fraction": 5.24},
            ),
            Block(
                "solubility",
                "weiss-1971",
                MoistAir(
                    A1=-167.2178,
                    A2=216.3442,
                    A3=139.2032,
                    A4=-22.6202,
                    B1=-0.044781,
                    B2=0.023541,
                    B3=-0.0034266,
                    mole_fraction=5.24e-6,
                    moles=1e-3 / WEISS_MOLAR_VOLUME,
                ),
                printed_in="the equation for moist air, mL kg-1",
                supplies={"air_mole_fraction": 5.24},
                note="mole fraction of Glueckauf (1951); 2.3 % under jenkins-2019 in sea water at 10 degC",
            ),
            Block(
                "schmidt_number",
                "wanninkhof-1992",
                Rows(sea=(410.14, -20.503, 0.53175, -0.0060111), fresh=(377.09, -19.154, 0.50137, -0.005669)),
                printed_in="Table A1; from memory, confirmed in part by viscosity over diffusivity",
            ),
            Block(
                "schmidt_number",
                "raymond-2012",
                Rows(sea=None, fresh=(368, -16.75, 0.374, -0.0036)),
                printed_in="Table 1; from memory",
                valid=FRESH_ONLY,
            ),
            Block(
                "diffusivity_in_fresh_water",
                "jahne-1987",
                Arrhenius(A=818e-5, activation_energy=11.70),
                printed_in="Table 4; from memory",
            ),
        ),
    )
)
