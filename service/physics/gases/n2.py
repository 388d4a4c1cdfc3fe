"""Nitrogen."""

from service.physics.declare import Block, Gas, gas, relative_uncertainty
from service.physics.schmidt_number.diffusivity import MolarVolume
from service.physics.schmidt_number.polynomials import SEA_ONLY, Rows
from service.physics.solubility.forms import MoistAir, ScaledTemperature

MOLAR_VOLUME = 22.4039  # L mol-1 at 0 degC and 1 atm, by the reference equation of state

N2 = gas(
    Gas(
        name="n2",
        formula="N2",
        title="nitrogen",
        molar_mass=28.014,
        element="N",
        element_mass=28.014,
        defaults={
            "solubility": "hamme-emerson-2004",
            "schmidt_number": "wanninkhof-1992",
            "diffusivity_in_fresh_water": "wilke-chang-1955",
        },
        constants={"storage_ratio": 1.0, "molar_volume_stp": MOLAR_VOLUME},
        dry_air="0.78084",
        blocks=(
            Block(
                "solubility",
                "hamme-emerson-2004",
                ScaledTemperature(
                    A=(6.42931, 2.92704, 4.32531, 4.69149),
                    B=(-7.44129e-3, -8.02566e-3, -1.46775e-2),
                    C0=0.0,
                    mole_fraction=0.78084,
                    moles=1e-6,
                ),
                printed_in="Table 4, umol kg-1",
                supplies={"air_mole_fraction": 0.78084e6},
                uncertainty=relative_uncertainty(0.0014, "author's estimate", "0.14 % (from memory)"),
            ),
            Block(
                "schmidt_number",
                "wanninkhof-1992",
                Rows(sea=(2206.1, -144.86, 4.5413, -0.056988), fresh=(1970.7, -131.45, 4.1390, -0.052106)),
                printed_in="Table A1; from memory, confirmed in part by viscosity over diffusivity",
            ),
            Block(
                "schmidt_number",
                "wanninkhof-2014",
                Rows(sea=(2304.8, -162.75, 6.2557, -0.13129, 0.0011255), fresh=None),
                printed_in="Table 1",
                valid=SEA_ONLY,
                note="no fresh-water row could be had: not offered below salinity 35",
            ),
            Block(
                "solubility_per_litre",
                "weiss-1970",
                MoistAir(
                    A1=-172.4965,
                    A2=248.4262,
                    A3=143.0738,
                    A4=-21.7120,
                    B1=-0.049781,
                    B2=0.025018,
                    B3=-0.0034861,
                    mole_fraction=0.78084,
                    moles=1e-3 / MOLAR_VOLUME,
                ),
                printed_in="the equation for moist air, mL L-1",
                supplies={"air_mole_fraction": 0.78084e6},
                note="mole fraction of Glueckauf (1951); mL of the real gas",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "wilke-chang-1955",
                MolarVolume(at_boiling_point=34.8),
                printed_in="molar volume: liquid at the boiling point by the reference equation of state of the fluid",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "hayduk-laudie-1974",
                MolarVolume(at_boiling_point=34.8),
                printed_in="molar volume: liquid at the boiling point by the reference equation of state of the fluid",
            ),
            Block(
                "steady_state_supersaturation",
                "woolf-thorpe-1991",
                7.2,
                printed_in="wind speed of one percent, m s-1; from memory",
            ),
        ),
    )
)
