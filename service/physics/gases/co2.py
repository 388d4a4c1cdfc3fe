"""Carbon dioxide."""

from service.physics.declare import Block, Gas, gas
from service.physics.schmidt_number.diffusivity import Arrhenius, MolarVolume
from service.physics.schmidt_number.polynomials import FRESH_ONLY, Rows
from service.physics.solubility.forms import Weiss
from service.physics.solubility.fugacity import Virial

CO2 = gas(
    Gas(
        name="co2",
        formula="CO2",
        title="carbon dioxide",
        molar_mass=44.009,
        element="C",
        element_mass=12.011,
        constants={"reacts_with_water": 1.0},
        defaults={
            "solubility": "weiss-1974",
            "fugacity": "weiss-1974",
            "temperature_correction": "by-salinity",
            "schmidt_number": "wanninkhof-2014",
            "diffusivity_in_fresh_water": "jahne-1987",
        },
        standard_names={
            "flux upward": "surface_upward_mole_flux_of_carbon_dioxide",
            "flux downward": "surface_downward_mole_flux_of_carbon_dioxide",
            "partial_pressure_in_water": "surface_partial_pressure_of_carbon_dioxide_in_sea_water",
        },
        dry_air="rising by 2 to 3 umol mol-1 a year: give it",
        caution="Displaces oxygen and is toxic above a few percent of air; gathers in wells, tanks and closed cabins.",
        blocks=(
            Block(
                "solubility",
                "weiss-1974",
                Weiss(A1=-60.2409, A2=93.4517, A3=23.3585, B1=0.023517, B2=-0.023656, B3=0.0047036),
                printed_in="Table I, moles per kilogram",
            ),
            Block(
                "solubility_per_litre",
                "weiss-1974",
                Weiss(A1=-58.0931, A2=90.5069, A3=22.2940, B1=0.027766, B2=-0.025888, B3=0.0050578),
                printed_in="Table I, moles per litre",
            ),
            Block(
                "fugacity_coefficient",
                "weiss-1974",
                Virial(B=(-1636.75, 12.0408, -3.27957e-2, 3.16528e-5), delta=(57.7, -0.118)),
                printed_in="Eqs. 6 and 11",
            ),
            Block("temperature_factor", "takahashi-1993", 0.0423, printed_in="abstract"),
            Block("temperature_factor", "by-salinity", 0.0423, printed_in="abstract"),
            Block("temperature_factor", "takahashi-2009", (0.0433, -4.35e-5), printed_in="Eq. 1"),
            Block(
                "schmidt_number",
                "wanninkhof-2014",
                Rows(
                    sea=(2116.8, -136.25, 4.7353, -0.092307, 0.0007555),
                    fresh=(1923.6, -125.06, 4.3773, -0.085681, 0.00070284),
                ),
                printed_in="Table 1",
            ),
            Block(
                "schmidt_number",
                "wanninkhof-1992",
                Rows(sea=(2073.1, -125.62, 3.6276, -0.043219), fresh=(1911.1, -118.11, 3.4527, -0.041320)),
                printed_in="Table A1; from memory, confirmed in part by viscosity over diffusivity",
            ),
            Block(
                "schmidt_number",
                "raymond-2012",
                Rows(sea=None, fresh=(1742, -91.24, 2.208, -0.0219)),
                printed_in="Table 1; from memory",
                valid=FRESH_ONLY,
            ),
            Block(
                "diffusivity_in_fresh_water",
                "jahne-1987",
                Arrhenius(A=5019e-5, activation_energy=19.51),
                printed_in="Table 4; from memory",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "wilke-chang-1955",
                MolarVolume(at_boiling_point=34.0),
                printed_in="molar volume: tabled by Poling et al. (2001); from memory",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "hayduk-laudie-1974",
                MolarVolume(at_boiling_point=34.0),
                printed_in="molar volume: tabled by Poling et al. (2001); from memory",
            ),
            Block(
                "steady_state_supersaturation",
                "woolf-thorpe-1991",
                49.0,
                printed_in="wind speed of one percent, m s-1; from memory",
            ),
        ),
    )
)
