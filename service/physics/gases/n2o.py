"""Nitrous oxide."""

from service.physics.declare import Block, Gas, gas
from service.physics.schmidt_number.diffusivity import MolarVolume
from service.physics.schmidt_number.polynomials import FRESH_ONLY, Rows
from service.physics.solubility.forms import Weiss
from service.physics.solubility.fugacity import Virial

N2O = gas(
    Gas(
        name="n2o",
        formula="N2O",
        title="nitrous oxide",
        molar_mass=44.013,
        element="N",
        element_mass=28.014,
        defaults={
            "solubility": "weiss-price-1980",
            "fugacity": "weiss-price-1980",
            "schmidt_number": "wanninkhof-2014",
            "diffusivity_in_fresh_water": "wilke-chang-1955",
        },
        constants={"storage_ratio": 1.0},
        dry_air="about 0.34e-6, rising: give it",
        caution="An anaesthetic and an oxidiser; keep closed rooms aired.",
        blocks=(
            Block(
                "solubility",
                "weiss-price-1980",
                Weiss(A1=-64.8539, A2=100.2520, A3=25.2049, B1=-0.062544, B2=0.035337, B3=-0.0054699),
                printed_in="Table 2, moles per kilogram",
            ),
            Block(
                "solubility_per_litre",
                "weiss-price-1980",
                Weiss(A1=-62.7062, A2=97.3066, A3=24.1406, B1=-0.058420, B2=0.033193, B3=-0.0051313),
                printed_in="Table 2, moles per litre",
            ),
            Block(
                "fugacity_coefficient",
                "weiss-price-1980",
                Virial(B=(-905.95, 4.1685, -0.0052734), delta=(65.0, -0.1338)),
                printed_in="Eqs. 5 to 8; from memory",
            ),
            Block(
                "schmidt_number",
                "wanninkhof-2014",
                Rows(
                    sea=(2356.2, -166.38, 6.3952, -0.13422, 0.0011506),
                    fresh=(2141.2, -152.56, 5.8963, -0.12411, 0.0010655),
                ),
                printed_in="Table 1",
            ),
            Block(
                "schmidt_number",
                "wanninkhof-1992",
                Rows(sea=(2301.1, -151.1, 4.7364, -0.059431), fresh=(2055.6, -137.11, 4.3173, -0.054350)),
                printed_in="Table A1; from memory, confirmed in part by viscosity over diffusivity",
            ),
            Block(
                "schmidt_number",
                "raymond-2012",
                Rows(sea=None, fresh=(2105, -130.08, 3.486, -0.0365)),
                printed_in="Table 1; from memory",
                valid=FRESH_ONLY,
            ),
            Block(
                "diffusivity_in_fresh_water",
                "wilke-chang-1955",
                MolarVolume(at_boiling_point=35.8),
                printed_in="molar volume: liquid at the boiling point by the reference equation of state of the fluid",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "hayduk-laudie-1974",
                MolarVolume(at_boiling_point=35.8),
                printed_in="molar volume: liquid at the boiling point by the reference equation of state of the fluid",
            ),
        ),
    )
)
