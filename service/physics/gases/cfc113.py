"""Chlorofluorocarbon 113, 1,1,2-trichloro-1,2,2-trifluoroethane."""

from service.physics.declare import Block, Gas, gas
from service.physics.schmidt_number.diffusivity import MolarVolume
from service.physics.solubility.forms import SolubilityFunction

CFC113 = gas(
    Gas(
        name="cfc113",
        formula="C2Cl3F3",
        title="1,1,2-trichloro-1,2,2-trifluoroethane",
        molar_mass=187.37,
        defaults={
            "solubility": "bu-warner-1995",
            "schmidt_number": "viscosity-over-diffusivity",
            "diffusivity_in_fresh_water": "wilke-chang-1955",
        },
        constants={"storage_ratio": 1.0},
        dry_air="falling: give it",
        caution="Six times as heavy as air: displaces oxygen, and disturbs the heart at high concentration.",
        blocks=(
            Block(
                "solubility",
                "bu-warner-1995",
                SolubilityFunction(
                    A1=-231.902,
                    A2=322.915,
                    A3=119.111,
                    A4=-1.3917,
                    B1=-0.02547,
                    B2=0.004540,
                    B3=0.0002708,
                ),
                printed_in="Table 4, F; from memory",
                note="Two copies of the set differ in the sign of B3. Plus is taken: salinity 35 then lowers the "
                "solubility at 20 degC by 29 %, as it does that of cfc11, cfc12 and sf6 (29 to 30 %); with minus it "
                "would be 40 %. Whether the set is per kilogram, as taken, or per litre could not be confirmed: if per "
                "litre, the true values per kilogram are 2.4 % lower in sea water and 0.2 % higher in fresh water.",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "wilke-chang-1955",
                MolarVolume(at_boiling_point=124.2),
                printed_in="molar volume: liquid at the boiling point by the reference equation of state of the fluid",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "hayduk-laudie-1974",
                MolarVolume(at_boiling_point=124.2),
                printed_in="molar volume: liquid at the boiling point by the reference equation of state of the fluid",
            ),
        ),
    )
)
