"""Oxygen."""

from service.physics.declare import Block, Gas, gas
from service.physics.schmidt_number.polynomials import Rows
from service.physics.solubility.forms import ScaledTemperature

O2 = gas(
    Gas(
        name="o2",
        formula="O2",
        title="oxygen",
        molar_mass=31.998,
        defaults={"solubility": "garcia-gordon-1992", "schmidt_number": "wanninkhof-2014"},
        constants={"storage_ratio": 1.0, "molar_volume_stp": 22.3916},
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
        ),
    )
)
