"""Dichlorodifluoromethane."""

from service.physics.declare import Block, Gas, gas
from service.physics.schmidt_number.diffusivity import Arrhenius, MolarVolume
from service.physics.schmidt_number.polynomials import SEA_ONLY, Rows
from service.physics.solubility.forms import Weiss

CFC12 = gas(
    Gas(
        name="cfc12",
        formula="CCl2F2",
        title="dichlorodifluoromethane",
        molar_mass=120.91,
        defaults={
            "solubility": "warner-weiss-1985",
            "schmidt_number": "wanninkhof-2014",
            "diffusivity_in_fresh_water": "zheng-1998",
        },
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
            Block(
                "schmidt_number",
                "zheng-1998",
                Rows(sea=(3845.4, -228.95, 6.1908, -0.067430), fresh=None),
                printed_in="the cubic for sea water; from memory",
                valid=SEA_ONLY,
                note="no fresh-water row: not offered below salinity 35",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "zheng-1998",
                Arrhenius(A=0.036, activation_energy=20.1),
                printed_in="the fit for pure water; from memory",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "wilke-chang-1955",
                MolarVolume(at_boiling_point=81.3),
                printed_in="molar volume: liquid at the boiling point by the reference equation of state of the fluid",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "hayduk-laudie-1974",
                MolarVolume(at_boiling_point=81.3),
                printed_in="molar volume: liquid at the boiling point by the reference equation of state of the fluid",
            ),
        ),
    )
)
