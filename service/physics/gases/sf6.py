"""Sulphur hexafluoride."""

from service.physics.declare import Block, Gas, gas
from service.physics.schmidt_number.diffusivity import Arrhenius, MolarVolume
from service.physics.schmidt_number.polynomials import FRESH_ONLY, SEA_ONLY, Rows
from service.physics.solubility.forms import Weiss

SF6 = gas(
    Gas(
        name="sf6",
        formula="SF6",
        title="sulphur hexafluoride",
        molar_mass=146.050,
        defaults={
            "solubility": "bullister-2002",
            "schmidt_number": "wanninkhof-2014",
            "diffusivity_in_fresh_water": "king-saltzman-1995",
        },
        constants={"storage_ratio": 1.0},
        standard_names={"flux downward": "surface_downward_mole_flux_of_sulfur_hexafluoride"},
        dry_air="about 11e-12, rising: give it",
        caution="Five times as heavy as air: displaces oxygen in pits and holds. A strong greenhouse gas.",
        blocks=(
            Block(
                "solubility",
                "bullister-2002",
                Weiss(A1=-98.7264, A2=142.803, A3=38.8746, B1=0.0268696, B2=-0.0334407, B3=0.00708440),
                printed_in="Table 3, mol kg-1 atm-1; from memory",
            ),
            Block(
                "solubility_per_litre",
                "bullister-2002",
                Weiss(A1=-96.5975, A2=139.883, A3=37.8193, B1=0.0310693, B2=-0.0356385, B3=0.00743254),
                printed_in="Table 3, mol L-1 atm-1",
            ),
            Block(
                "schmidt_number",
                "wanninkhof-2014",
                Rows(
                    sea=(3177.5, -200.57, 6.8865, -0.13335, 0.0010877),
                    fresh=(3035, -196.35, 6.851, -0.13387, 0.0010972),
                ),
                printed_in="Table 1",
                note="fresh-water row from memory",
            ),
            Block(
                "schmidt_number",
                "wanninkhof-1992",
                Rows(sea=(3531.6, -231.40, 7.2168, -0.090558), fresh=(3255.3, -217.13, 6.8370, -0.086070)),
                printed_in="Table A1; from memory, confirmed in part by viscosity over diffusivity",
            ),
            Block(
                "schmidt_number",
                "king-saltzman-1995",
                Rows(sea=(3016.1, -172.00, 4.4996, -0.047965), fresh=None),
                printed_in="the cubic for sea water; from memory",
                valid=SEA_ONLY,
                note="no fresh-water row: not offered below salinity 35",
            ),
            Block(
                "schmidt_number",
                "raymond-2012",
                Rows(sea=None, fresh=(3255, -217.13, 6.837, -0.0861)),
                printed_in="Table 1; from memory",
                valid=FRESH_ONLY,
            ),
            Block(
                "diffusivity_in_fresh_water",
                "king-saltzman-1995",
                Arrhenius(A=0.029, activation_energy=19.3),
                printed_in="the fit for pure water; from memory",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "wilke-chang-1955",
                MolarVolume(at_boiling_point=77.8),
                printed_in="molar volume: sum of Le Bas's atomic volumes as tabled there; from memory",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "hayduk-laudie-1974",
                MolarVolume(at_boiling_point=77.8),
                printed_in="molar volume: sum of Le Bas's atomic volumes as tabled there; from memory",
            ),
        ),
    )
)
