"""Nitrogen."""

from service.physics.declare import Block, Gas, gas, relative_uncertainty
from service.physics.schmidt_number.polynomials import Rows
from service.physics.solubility.forms import ScaledTemperature

N2 = gas(
    Gas(
        name="n2",
        formula="N2",
        title="nitrogen",
        molar_mass=28.014,
        element="N",
        element_mass=28.014,
        defaults={"solubility": "hamme-emerson-2004", "schmidt_number": "wanninkhof-1992"},
        constants={"storage_ratio": 1.0},
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
                note="no fresh-water row could be had: not offered below salinity 35",
            ),
        ),
    )
)
