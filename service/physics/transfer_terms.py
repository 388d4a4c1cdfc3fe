"""The words that only some transfer velocity methods use: their inputs, the spread of the wind, bubbles."""

from service.physics.declare import family, input_term, side, term

input_term(
    "wind_averaging",
    "s",
    "duration over which wind_speed is a mean; left out, nothing is judged by it",
    possible=(0.0, 1.0e11),
    scale=1000.0,
    holds="request",
    used_with=("wind_speed",),
    example=600.0,
)
input_term(
    "wind_speed_variance",
    "m2 s-2",
    "variance of the wind speed within the time over which wind_speed is a mean, at its height",
    possible=(0.0, 2500.0),
    scale=10.0,
    used_with=("wind_speed",),
    example=9.0,
)
input_term(
    "weibull_shape",
    "1",
    "shape of the Weibull distribution of the wind speed within the time over which wind_speed is a mean",
    possible=(0.5, 100.0),
    used_with=("wind_speed",),
    example=2.0,
)
input_term(
    "friction_velocity",
    "m s-1",
    "friction velocity in the air; left out, that of the wind profile",
    possible=(0.0, 10.0),
    example=0.25,
)
input_term(
    "significant_wave_height",
    "m",
    "significant height of the waves",
    possible=(0.0, 40.0),
    standard_name="sea_surface_wave_significant_height",
    example=2.1,
)
input_term("rain_rate", "mm h-1", "rate of rain", possible=(0.0, 400.0), scale=10.0, example=4.0)
input_term(
    "lake_area", "km2", "area of the lake", possible=(0.0, 4.0e5), above_lower_limit=True, scale=10.0, example=3.2
)
input_term(
    "water_depth",
    "m",
    "mean depth of the stream or estuary",
    possible=(0.0, 12000.0),
    above_lower_limit=True,
    example=0.6,
)
input_term("flow_velocity", "m s-1", "velocity of the current", possible=(0.0, 15.0), example=0.4)
input_term("slope", "1", "slope of the stream, fall over length", possible=(0.0, 1.0), scale=0.01, example=0.005)
input_term(
    "discharge",
    "m3 s-1",
    "discharge of the stream",
    possible=(0.0, 5.0e5),
    above_lower_limit=True,
    example=1.2,
)

OWN = ("own_constant", "own_linear_coefficient", "own_quadratic_coefficient", "own_cubic_coefficient")
for _name, _meaning in zip(
    OWN,
    (
        "constant of the caller's own polynomial in wind speed",
        "factor of the wind speed in m s-1 in the caller's own polynomial",
        "factor of its square in the caller's own polynomial",
        "factor of its cube in the caller's own polynomial",
    ),
    strict=True,
):
    input_term(_name, "cm h-1", _meaning, possible=(-1.0e4, 1.0e4), default=0.0, holds="request", example=0.2)
input_term(
    "own_reference_schmidt_number",
    "1",
    "Schmidt number for which the caller's own polynomial gives the transfer velocity",
    possible=(0.0, 1.0e5),
    above_lower_limit=True,
    default=660.0,
    scale=1000.0,
    holds="request",
    used_with=OWN,
    example=600.0,
)

term("friction_velocity_water", "m s-1", "friction velocity in the water")
term(
    "bubble_injection_per_atmosphere",
    "mmol m-2 d-1 atm-1",
    "gas that bubbles carry into open water, per partial pressure in the air",
    of_gas=True,
)
term(
    "steady_state_supersaturation",
    "%",
    "supersaturation that bubbles sustain where nothing else moves the gas",
    of_gas=True,
)
term("partial_pressure_in_bubbles", "uatm", "partial pressure of the gas in the air that bubbles carry", of_gas=True)
term("fugacity_coefficient_at_air_fugacity", "1", "fugacity over partial pressure where the fugacity is known")

side("wind_spread", ("wind_speed_variance", "weibull_shape"), "the spread of the wind")
family(
    "supersaturation",
    "supersaturation_method",
    "supersaturation that bubbles sustain",
    ("steady_state_supersaturation",),
    default="bubble-injection",
)
