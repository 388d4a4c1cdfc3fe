"""Dichlorodifluoromethane."""

from service.physics.declare import Block, Gas, gas
from service.physics.schmidt_number.polynomials import Rows
from service.physics.solubility.forms import Weiss

CFC12 = gas(
    Gas(
        name="cfc12",
        formula="CCl2F2",
        title="dichlorodifluoromethane",
        molar_mass=120.91,
        defaults={"solubility": "warner-weiss-1985", "schmidt_number": "wanninkhof-2014"},
        constants={"storage_ratio": 1.0},
        standard_names={"flux downward": "surface_downward_mole_flux_of_cfc12"},
        dry_air="falling: give it",
        blocks=(
            Block(
                "solubility",
                "warner-weiss-1985",
                Weiss(A1=-124.4395, A2=185.4299, A3=51.6383, B1=-0.149779, B2=0.094668, B3=-0.0160043),
                printed_in="Table 5, mol kg-1 atm-1; from memory",
            ),
            Block(
                "solubility_per_litre",
                "warner-weiss-1985",
                Weiss(A1=-122.3246, A2=182.5306, A3=50.5898, B1=-0.145633, B2=0.092509, B3=-0.0156627),
                printed_in="Table 5, mol L-1 atm-1",
            ),
            Block(
                "schmidt_number",
                "wanninkhof-2014",
                Rows(
                    sea=(3828.1, -249.86, 8.7603, -0.1716, 0.001408),
                    fresh=(3478.6, -229.32, 8.0961, -0.15923, 0.0013095),
                ),
                printed_in="Table 1",
                note="fresh-water row from memory",
            ),
            Block(
                "schmidt_number",
                "wanninkhof-1992",
                Rows(sea=(3713.2, -243.30, 7.5879, -0.095215), fresh=(3422.7, -228.30, 7.1886, -0.090496)),
                printed_in="Table A1; from memory, confirmed in part by viscosity over diffusivity",
            ),
        ),
    )
)
