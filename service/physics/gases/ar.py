"""Argon."""

from service.physics.declare import Block, Gas, gas, relative_uncertainty
from service.physics.schmidt_number.polynomials import Rows
from service.physics.solubility.forms import ScaledTemperature

AR = gas(
    Gas(
        name="ar",
        formula="Ar",
        title="argon",
        molar_mass=39.948,
        defaults={"solubility": "hamme-emerson-2004", "schmidt_number": "wanninkhof-2014"},
        constants={"storage_ratio": 1.0},
        dry_air="0.00934",
        blocks=(
            Block(
                "solubility",
                "hamme-emerson-2004",
                ScaledTemperature(
                    A=(2.79150, 3.17609, 4.13116, 4.90379),
                    B=(-6.96233e-3, -7.66670e-3, -1.16888e-2),
                    C0=0.0,
                    mole_fraction=0.00934,
                ),
                printed_in="Table 4, umol kg-1",
                supplies={"air_mole_fraction": 0.00934e6},
                uncertainty=relative_uncertainty(0.0013, "author's estimate", "0.13 % (from memory)"),
            ),
            Block(
                "schmidt_number",
                "wanninkhof-2014",
                Rows(
                    sea=(2078.1, -146.74, 5.6403, -0.11838, 0.0010148),
                    fresh=(1888.4, -134.55, 5.2003, -0.10946, 0.00093975),
                ),
                printed_in="Table 1",
                note="fresh-water row from memory",
            ),
            Block(
                "schmidt_number",
                "wanninkhof-1992",
                Rows(sea=(1909.1, -125.09, 3.9012, -0.048953), fresh=(1759.7, -117.37, 3.6959, -0.046527)),
                printed_in="Table A1; from memory, confirmed in part by viscosity over diffusivity",
            ),
        ),
    )
)
