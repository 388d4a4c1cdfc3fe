"""Oxygen."""

from service.physics.declare import Block, Gas, gas
from service.physics.schmidt_number.diffusivity import MolarVolume
from service.physics.schmidt_number.polynomials import FRESH_ONLY, SEA_ONLY, Rows
from service.physics.solubility.forms import MoistAir, ScaledTemperature

OXYGEN_MOLAR_VOLUME = 22.3916  # L mol-1 at 0 degC and 1 atm; Garcia and Gordon (1992)

O2 = gas(
    Gas(
        name="o2",
        formula="O2",
        title="oxygen",
        molar_mass=31.998,
        defaults={
            "solubility": "garcia-gordon-1992",
            "schmidt_number": "wanninkhof-2014",
            "diffusivity_in_fresh_water": "wilke-chang-1955",
        },
        constants={"storage_ratio": 1.0, "molar_volume_stp": OXYGEN_MOLAR_VOLUME},
        standard_names={
            "flux downward": "surface_downward_mole_flux_of_molecular_oxygen",
            "concentration_in_water_per_litre": "mole_concentration_of_dissolved_molecular_oxygen_in_sea_water",
        },
        dry_air="0.20946",
        caution="Water without oxygen kills; its basins and tanks can hold hydrogen sulphide and air without oxygen.",
        blocks=(
            Block(
                "solubility",
                "garcia-gordon-1992",
                ScaledTemperature(
                    A=(5.80871, 3.20291, 4.17887, 5.10006, -9.86643e-2, 3.80369),
                    B=(-7.01577e-3, -7.70028e-3, -1.13864e-2, -9.51519e-3),
                    C0=-2.75915e-7,
                    mole_fraction=0.20946,
                    moles=1e-6,
                ),
                printed_in="Table 1, Benson and Krause, umol kg-1",
                supplies={"air_mole_fraction": 0.20946e6},
            ),
            Block(
                "solubility_per_litre",
                "garcia-gordon-1992",
                ScaledTemperature(
                    A=(2.00907, 3.22014, 4.05010, 4.94457, -2.56847e-1, 3.88767),
                    B=(-6.24523e-3, -7.37614e-3, -1.03410e-2, -8.17083e-3),
                    C0=-4.88682e-7,
                    mole_fraction=0.20946,
                    moles=1e-3 / OXYGEN_MOLAR_VOLUME,
                ),
                printed_in="Table 1, Benson and Krause, mL L-1",
                supplies={"air_mole_fraction": 0.20946e6},
            ),
            Block(
                "solubility",
                "garcia-gordon-1992-combined",
                ScaledTemperature(
                    A=(5.80818, 3.20684, 4.11890, 4.93845, 1.01567, 1.41575),
                    B=(-7.01211e-3, -7.25958e-3, -7.93334e-3, -5.54491e-3),
                    C0=-1.32412e-7,
                    mole_fraction=0.20946,
                    moles=1e-6,
                ),
                printed_in="Table 1, combined fit, umol kg-1",
                supplies={"air_mole_fraction": 0.20946e6},
            ),
            Block(
                "schmidt_number",
                "wanninkhof-2014",
                Rows(
                    sea=(1920.4, -135.6, 5.2122, -0.10939, 0.00093777),
                    fresh=(1745.1, -124.34, 4.8055, -0.10115, 0.00086842),
                ),
                printed_in="Table 1",
            ),
            Block(
                "schmidt_number",
                "wanninkhof-1992",
                Rows(sea=(1953.4, -128.00, 3.9918, -0.050091), fresh=(1800.6, -120.10, 3.7818, -0.047608)),
                printed_in="Table A1; from memory, confirmed in part by viscosity over diffusivity",
            ),
            Block(
                "solubility_per_litre",
                "weiss-1970",
                MoistAir(
                    A1=-173.4292,
                    A2=249.6339,
                    A3=143.3483,
                    A4=-21.8492,
                    B1=-0.033096,
                    B2=0.014259,
                    B3=-0.0017000,
                    mole_fraction=0.20946,
                    moles=1e-3 / OXYGEN_MOLAR_VOLUME,
                ),
                printed_in="the equation for moist air, mL L-1",
                supplies={"air_mole_fraction": 0.20946e6},
                note="mole fraction of Glueckauf (1951); mL of the real gas",
            ),
            Block(
                "schmidt_number",
                "keeling-1998",
                Rows(sea=(1638, -81.83, 1.483, -0.008004), fresh=None),
                printed_in="the cubic for sea water; from memory",
                valid=SEA_ONLY,
                note="no fresh-water row: not offered below salinity 35",
            ),
            Block(
                "schmidt_number",
                "raymond-2012",
                Rows(sea=None, fresh=(1568, -86.04, 2.142, -0.0216)),
                printed_in="Table 1; from memory",
                valid=FRESH_ONLY,
            ),
            Block(
                "diffusivity_in_fresh_water",
                "wilke-chang-1955",
                MolarVolume(at_boiling_point=28.0),
                printed_in="molar volume: liquid at the boiling point by the reference equation of state of the fluid",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "hayduk-laudie-1974",
                MolarVolume(at_boiling_point=28.0),
                printed_in="molar volume: liquid at the boiling point by the reference equation of state of the fluid",
            ),
            Block(
                "steady_state_supersaturation",
                "woolf-thorpe-1991",
                9.0,
                printed_in="wind speed of one percent, m s-1; from memory",
            ),
        ),
    )
)
