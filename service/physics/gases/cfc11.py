"""Trichlorofluoromethane."""

from service.physics.declare import Block, Gas, gas
from service.physics.schmidt_number.polynomials import Rows
from service.physics.solubility.forms import Weiss

CFC11 = gas(
    Gas(
        name="cfc11",
        formula="CCl3F",
        title="trichlorofluoromethane",
        molar_mass=137.37,
        defaults={"solubility": "warner-weiss-1985", "schmidt_number": "wanninkhof-2014"},
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
        ),
    )
)
