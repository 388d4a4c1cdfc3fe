"""Carbon monoxide."""

from service.physics.constants import MOLAR_VOLUME_IDEAL
from service.physics.declare import Block, Gas, gas
from service.physics.schmidt_number.diffusivity import MolarVolume
from service.physics.solubility.forms import MoistAir

CO = gas(
    Gas(
        name="co",
        formula="CO",
        title="carbon monoxide",
        molar_mass=28.010,
        element="C",
        element_mass=12.011,
        defaults={
            "solubility": "wiesenburg-guinasso-1979",
            "schmidt_number": "viscosity-over-diffusivity",
            "diffusivity_in_fresh_water": "wilke-chang-1955",
        },
        constants={"storage_ratio": 1.0},
        dry_air="0.05e-6 to 0.2e-6, changing by place and season: give it",
        caution="Very toxic without smell or colour, and burns in air; work with a detector and keep rooms aired.",
        blocks=(
            Block(
                "solubility_per_litre",
                "wiesenburg-guinasso-1979",
                MoistAir(
                    A1=-169.4951,
                    A2=263.5657,
                    A3=159.2552,
                    A4=-25.4967,
                    B1=0.051198,
                    B2=-0.044591,
                    B3=0.0086462,
                    moles=1e-9 / MOLAR_VOLUME_IDEAL,
                ),
                printed_in="Table VI, nL L-1; from memory",
                note="nL of an ideal gas, as the authors' methane sets imply",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "wilke-chang-1955",
                MolarVolume(at_boiling_point=35.3),
                printed_in="molar volume: liquid at the boiling point by the reference equation of state of the fluid",
            ),
            Block(
                "diffusivity_in_fresh_water",
                "hayduk-laudie-1974",
                MolarVolume(at_boiling_point=35.3),
                printed_in="molar volume: liquid at the boiling point by the reference equation of state of the fluid",
            ),
        ),
    )
)
