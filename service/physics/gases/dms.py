"""Dimethyl sulphide."""

from service.physics.declare import Block, Gas, gas
from service.physics.schmidt_number.diffusivity import Arrhenius, MolarVolume
from service.physics.schmidt_number.polynomials import SEA_ONLY, Rows
from service.physics.solubility.forms import InverseTemperature

DMS = gas(
    Gas(
        name="dms",
        formula="C2H6S",
        title="dimethyl sulphide",
        molar_mass=62.13,
        element="S",
        element_mass=32.06,
        defaults={
            "solubility": "dacey-1984",
            "schmidt_number": "wanninkhof-2014",
            "diffusivity_in_fresh_water": "saltzman-1993",
            "air_side": "duce-1991",
        },
        constants={"storage_ratio": 1.0},
        standard_names={"flux upward": "surface_upward_mole_flux_of_dimethyl_sulfide"},
        dry_air="near zero over the open sea, but never assumed: give it",
        caution="Flammable, and toxic well above its threshold of smell.",
        blocks=(
            Block(
                "solubility_per_litre",
                "dacey-1984",
                InverseTemperature(intercept=12.64, slope=-3547.0),
                printed_in="sea-water fit; from memory",
            ),
            Block(
                "schmidt_number",
                "wanninkhof-2014",
                Rows(
                    sea=(2855.7, -177.63, 6.0438, -0.11645, 0.00094743),
                    fresh=(2595, -163.12, 5.5902, -0.10817, 0.00088204),
                ),
                printed_in="Table 1",
                note="fresh-water row from memory",
            ),
            Block(
                "schmidt_number",
                "saltzman-1993",
                Rows(sea=(2674.0, -147.12, 3.726, -0.038), fresh=None),
                printed_in="the cubic for sea water; from memory",
                valid=SEA_ONLY,
                note="no fresh-water row: not offered below salinity 35",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "saltzman-1993",
                Arrhenius(A=0.020, activation_energy=18.1),
                printed_in="the fit for pure water; from memory",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "wilke-chang-1955",
                MolarVolume(at_boiling_point=77.4),
                printed_in="molar volume: sum of Le Bas's atomic volumes as tabled there; from memory",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "hayduk-laudie-1974",
                MolarVolume(at_boiling_point=77.4),
                printed_in="molar volume: sum of Le Bas's atomic volumes as tabled there; from memory",
            ),
        ),
    )
)
