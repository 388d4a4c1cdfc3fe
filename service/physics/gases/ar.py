"""Argon."""

from service.physics.declare import Block, Gas, gas, relative_uncertainty
from service.physics.schmidt_number.diffusivity import MolarVolume
from service.physics.schmidt_number.polynomials import FRESH_ONLY, Rows
from service.physics.solubility.forms import MoistAir, ScaledTemperature

MOLAR_VOLUME = 22.3929  # L mol-1 at 0 degC and 1 atm, by the reference equation of state

AR = gas(
    Gas(
        name="ar",
        formula="Ar",
        title="argon",
        molar_mass=39.948,
        defaults={
            "solubility": "hamme-emerson-2004",
            "schmidt_number": "wanninkhof-2014",
            "diffusivity_in_fresh_water": "wilke-chang-1955",
        },
        constants={"storage_ratio": 1.0, "molar_volume_stp": MOLAR_VOLUME},
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
                    moles=1e-6,
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
            Block(
                "solubility",
                "jenkins-2019",
                MoistAir(
                    A1=-227.4607,
                    A2=305.4347,
                    A3=180.5278,
                    A4=-27.99450,
                    B1=-0.066942,
                    B2=0.037201,
                    B3=-0.0056364,
                    C1=-5.30325e-6,
                    mole_fraction=0.00934,
                    moles=1.0,
                ),
                printed_in="Table 4, mol kg-1",
                supplies={"air_mole_fraction": 0.00934e6},
            ),
            Block(
                "solubility_per_litre",
                "weiss-1970",
                MoistAir(
                    A1=-173.5146,
                    A2=245.4510,
                    A3=141.8222,
                    A4=-21.8020,
                    B1=-0.034474,
                    B2=0.014934,
                    B3=-0.0017729,
                    mole_fraction=0.00934,
                    moles=1e-3 / MOLAR_VOLUME,
                ),
                printed_in="the equation for moist air, mL L-1; from memory",
                supplies={"air_mole_fraction": 0.00934e6},
                note="mole fraction of Glueckauf (1951); mL of the real gas",
            ),
            Block(
                "schmidt_number",
                "raymond-2012",
                Rows(sea=None, fresh=(1799, -106.96, 2.797, -0.0289)),
                printed_in="Table 1; from memory",
                valid=FRESH_ONLY,
            ),
            Block(
                "diffusivity_in_fresh_water",
                "wilke-chang-1955",
                MolarVolume(at_boiling_point=28.6),
                printed_in="molar volume: liquid at the boiling point by the reference equation of state of the fluid",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "hayduk-laudie-1974",
                MolarVolume(at_boiling_point=28.6),
                printed_in="molar volume: liquid at the boiling point by the reference equation of state of the fluid",
            ),
            Block(
                "steady_state_supersaturation",
                "woolf-thorpe-1991",
                9.6,
                printed_in="wind speed of one percent, m s-1; from memory",
            ),
        ),
    )
)
