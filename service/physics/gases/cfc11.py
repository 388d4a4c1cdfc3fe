"""Trichlorofluoromethane."""

from service.physics.declare import Block, Gas, gas
from service.physics.schmidt_number.diffusivity import Arrhenius, MolarVolume
from service.physics.schmidt_number.polynomials import SEA_ONLY, Rows
from service.physics.solubility.forms import Weiss

CFC11 = gas(
    Gas(
        name="cfc11",
        formula="CCl3F",
        title="trichlorofluoromethane",
        molar_mass=137.36,
        defaults={
            "solubility": "warner-weiss-1985",
            "schmidt_number": "wanninkhof-2014",
            "diffusivity_in_fresh_water": "zheng-1998",
        },
        constants={"storage_ratio": 1.0},
        standard_names={"flux downward": "surface_downward_mole_flux_of_cfc11"},
        dry_air="falling: give it",
        blocks=(
            Block(
                "solubility",
                "warner-weiss-1985",
                Weiss(A1=-136.2685, A2=206.1150, A3=57.2805, B1=-0.148598, B2=0.095114, B3=-0.0163396),
                printed_in="Table 5, mol kg-1 atm-1; from memory",
            ),
            Block(
                "solubility_per_litre",
                "warner-weiss-1985",
                Weiss(A1=-134.1536, A2=203.2156, A3=56.2320, B1=-0.144449, B2=0.092952, B3=-0.0159977),
                printed_in="Table 5, mol L-1 atm-1",
            ),
            Block(
                "schmidt_number",
                "wanninkhof-2014",
                Rows(
                    sea=(3579.2, -222.63, 7.5749, -0.14595, 0.0011874),
                    fresh=(3460, -217.49, 7.4537, -0.14423, 0.0011761),
                ),
                printed_in="Table 1",
                note="fresh-water row from memory",
            ),
            Block(
                "schmidt_number",
                "wanninkhof-1992",
                Rows(sea=(4039.8, -264.70, 8.2552, -0.10359), fresh=(3723.7, -248.37, 7.8208, -0.098455)),
                printed_in="Table A1; from memory, confirmed in part by viscosity over diffusivity",
            ),
            Block(
                "schmidt_number",
                "zheng-1998",
                Rows(sea=(3501.8, -210.31, 6.1851, -0.07513), fresh=None),
                printed_in="the cubic for sea water; from memory",
                valid=SEA_ONLY,
                note="no fresh-water row: not offered below salinity 35",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "zheng-1998",
                Arrhenius(A=0.015, activation_energy=18.1),
                printed_in="the fit for pure water; from memory",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "wilke-chang-1955",
                MolarVolume(at_boiling_point=92.9),
                printed_in="molar volume: liquid at the boiling point by the reference equation of state of the fluid",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "hayduk-laudie-1974",
                MolarVolume(at_boiling_point=92.9),
                printed_in="molar volume: liquid at the boiling point by the reference equation of state of the fluid",
            ),
        ),
    )
)
