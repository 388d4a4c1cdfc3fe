"""The vocabulary: every word that a request or an answer may hold, with its unit and the limits of the possible."""

from service.physics.declare import family, input_term, side, term

INLAND = ("lake", "stream")
WATERS = ("ocean", "coastal", "estuary", *INLAND)

# What the instruments say.
input_term(
    "water_temperature",
    "degC",
    "temperature of the water at intake or probe, ITS-90",
    possible=(-5.0, 60.0),
    scale=10.0,
    example=18.4,
)
input_term(
    "salinity",
    "1",
    "practical salinity, PSS-78; 0 is fresh water",
    possible=(0.0, 60.0),
    dimension="salinity",
    scale=10.0,
    example=35.1,
)
input_term(
    "latitude", "degree", "latitude, north positive", possible=(-86.0, 90.0), example=-41.5, used_with=("longitude",)
)
input_term(
    "longitude", "degree", "longitude, east positive", possible=(-180.0, 360.0), example=176.2, used_with=("latitude",)
)
input_term(
    "air_pressure",
    "hPa",
    "air pressure at the barometer, not reduced to sea level",
    possible=(400.0, 1100.0),
    default=1013.25,
    no_default_for_water=INLAND,
    scale=1000.0,
    example=1008.2,
)
input_term(
    "barometer_height",
    "m",
    "height of the barometer above the water",
    possible=(-10.0, 200.0),
    default=0.0,
    scale=10.0,
    example=12.0,
    used_with=("air_pressure",),
)
input_term(
    "elevation",
    "m",
    "elevation of the water above sea level, which gives the pressure where none is measured",
    possible=(-500.0, 6000.0),
    scale=1000.0,
    example=420.0,
)
input_term(
    "wind_speed",
    "m s-1",
    "wind speed as measured",
    possible=(0.0, 100.0),
    scale=10.0,
    standard_name="wind_speed",
    example=7.5,
)
input_term(
    "wind_height",
    "m",
    "height above the water at which the wind was measured",
    possible=(0.5, 200.0),
    default=10.0,
    scale=10.0,
    example=18.0,
    used_with=("wind_speed",),
)
input_term(
    "air_mole_fraction",
    "umol mol-1",
    "mole fraction of the gas in dry air",
    possible=(0.0, 1.0e6),
    scale=100.0,
    of_gas=True,
    example=419.0,
)
input_term(
    "air_partial_pressure",
    "uatm",
    "partial pressure of the gas in the air at the interface",
    possible=(0.0, 1.1e6),
    scale=100.0,
    of_gas=True,
    example=409.0,
)
input_term(
    "air_fugacity",
    "uatm",
    "fugacity of the gas in the air at the interface",
    possible=(0.0, 1.1e6),
    scale=100.0,
    of_gas=True,
    example=407.5,
)
input_term(
    "water_mole_fraction",
    "umol mol-1",
    "mole fraction of the gas in dried air in continuous equilibrium with the water",
    possible=(0.0, 1.0e6),
    scale=100.0,
    of_gas=True,
    example=380.0,
)
input_term(
    "water_partial_pressure",
    "uatm",
    "partial pressure of the gas in air in equilibrium with the water at its temperature",
    possible=(0.0, 5.0e6),
    scale=100.0,
    of_gas=True,
    example=372.0,
)
input_term(
    "water_fugacity",
    "uatm",
    "fugacity of the gas in the water at its temperature",
    possible=(0.0, 5.0e6),
    scale=100.0,
    of_gas=True,
    example=371.0,
)
input_term(
    "water_concentration",
    "umol kg-1",
    "concentration of the dissolved gas; for co2 of CO2(aq) + H2CO3, never total carbon",
    possible=(0.0, 1.0e6),
    per_litre="water_concentration_per_litre",
    scale=100.0,
    of_gas=True,
    example=13.2,
)
input_term("ice_fraction", "1", "fraction of the water covered by ice", possible=(0.0, 1.0), default=0.0)
input_term(
    "given_transfer_velocity",
    "cm h-1",
    "the caller's own transfer velocity for this gas in this water",
    possible=(0.0, 1.0e4),
    scale=10.0,
    example=12.0,
)
input_term(
    "given_transfer_velocity_600",
    "cm h-1",
    "the caller's own transfer velocity at a Schmidt number of 600",
    possible=(0.0, 1.0e4),
    scale=10.0,
    example=12.0,
)
input_term(
    "given_transfer_velocity_660",
    "cm h-1",
    "the caller's own transfer velocity at a Schmidt number of 660",
    possible=(0.0, 1.0e4),
    scale=10.0,
    example=12.0,
)
input_term(
    "schmidt_exponent",
    "1",
    "exponent n in k proportional to Sc^-n, for the caller's own transfer velocity",
    possible=(0.0, 1.0),
    default=0.5,
    used_with=(
        *("given_transfer_velocity_600", "given_transfer_velocity_660"),
        *("own_constant", "own_linear_coefficient", "own_quadratic_coefficient", "own_cubic_coefficient"),
    ),
)
input_term(
    "mixed_layer_depth",
    "m",
    "depth of the mixed layer",
    possible=(0.0, 12000.0),
    above_lower_limit=True,
    scale=10.0,
    standard_name="ocean_mixed_layer_thickness",
    example=40.0,
)
input_term(
    "fraction",
    "1",
    "fraction of the way to equilibrium that time_to_fraction refers to",
    possible=(0.0, 0.999999),
    default=0.95,
    holds="request",
)

# What the gas brings.
term(
    "water_concentration_per_litre",
    "umol L-1",
    "concentration of the dissolved gas, per volume",
    possible=(0.0, 1.0e6),
    scale=100.0,
    of_gas=True,
)

term("molar_mass", "g mol-1", "molar mass of the gas")
term("decay_constant", "s-1", "part of the gas that decays in a unit of time", constant=0.0)

# Water and air.
term("density", "kg m-3", "density of the water at the surface", standard_name="sea_water_density")
term("absolute_salinity", "g kg-1", "Absolute Salinity, TEOS-10", standard_name="sea_water_absolute_salinity")
term("surface_pressure", "hPa", "air pressure at the water surface", standard_name="surface_air_pressure")
term("water_vapour_pressure", "hPa", "pressure of water vapour over this water")

# Solubility.
term(
    "solubility",
    "mol kg-1 atm-1",
    "concentration in the water over fugacity, K0",
    per_litre="solubility_per_litre",
)
term("solubility_per_litre", "mol L-1 atm-1", "concentration in the water over fugacity, K0, per volume")
term("bunsen_coefficient", "1", "volume of gas at 0 degC and 1 atm in a volume of water under 1 atm of the gas")
term("ostwald_coefficient", "1", "concentration in the water over concentration in the gas phase")
term(
    "henry_constant",
    "atm kg mol-1",
    "fugacity over concentration in the water",
    per_litre="henry_constant_per_litre",
)
term("henry_constant_per_litre", "atm L mol-1", "fugacity over concentration in the water, per volume")
term("fugacity_coefficient", "1", "fugacity over partial pressure of the gas in the air")
term(
    "fugacity_coefficient_in_water",
    "1",
    "fugacity over partial pressure in air in equilibrium with the water",
)

# Both sides of the interface.
term("partial_pressure_in_air", "uatm", "partial pressure of the gas in the air at the interface", of_gas=True)
term("partial_pressure_in_water", "uatm", "partial pressure of the gas in the water", of_gas=True)
term("fugacity_in_air", "uatm", "fugacity of the gas in the air at the interface", of_gas=True)
term("fugacity_in_water", "uatm", "fugacity of the gas in the water", of_gas=True)
term("fugacity_difference", "uatm", "fugacity in the water minus fugacity in the air", of_gas=True)
term(
    "equilibrium_concentration",
    "umol kg-1",
    "concentration in equilibrium with the air",
    per_litre="equilibrium_concentration_per_litre",
    of_gas=True,
)
term(
    "equilibrium_concentration_per_litre",
    "umol L-1",
    "concentration in equilibrium with the air",
    of_gas=True,
)
term(
    "concentration_in_water",
    "umol kg-1",
    "concentration of the dissolved gas",
    per_litre="concentration_in_water_per_litre",
    of_gas=True,
)
term("concentration_in_water_per_litre", "umol L-1", "concentration of the dissolved gas", of_gas=True)
term("saturation", "%", "concentration in percent of the one in equilibrium with the air", of_gas=True)

# Transfer.
term("schmidt_number", "1", "kinematic viscosity of the water over diffusivity of the gas")
term("kinematic_viscosity", "m2 s-1", "dynamic viscosity of the water over its density")
term("diffusivity", "m2 s-1", "molecular diffusivity of the gas in this water")
term("diffusivity_in_fresh_water", "m2 s-1", "molecular diffusivity of the gas in fresh water of this temperature")
term("schmidt_number_600", "1", "that of co2 in fresh water at 20 degC, by convention", constant=600.0)
term("schmidt_number_660", "1", "that of co2 in sea water at 20 degC, by convention", constant=660.0)
term("wind_speed_10m", "m s-1", "neutral wind speed at 10 m", standard_name="wind_speed")
term("wind_speed_10m_second_moment", "m2 s-2", "mean square of the neutral wind speed at 10 m")
term("wind_speed_10m_third_moment", "m3 s-3", "mean cube of the neutral wind speed at 10 m")
term("friction_velocity_air", "m s-1", "friction velocity in the air")
term("transfer_velocity_at_reference", "cm h-1", "transfer velocity at the method's reference Schmidt number")
term("reference_schmidt_number", "1", "the Schmidt number for which a method states its transfer velocity")
term("transfer_velocity_without_rain", "cm h-1", "transfer velocity of this gas in this water, but for rain")
term("transfer_velocity", "cm h-1", "gas transfer (piston) velocity of this gas in this water, of open water")
term("transfer_velocity_600", "cm h-1", "the method's transfer velocity at a Schmidt number of 600")
term("transfer_velocity_660", "cm h-1", "the method's transfer velocity at a Schmidt number of 660")
term("air_side_transfer_velocity", "cm h-1", "transfer velocity on the air side of the interface")
term("total_transfer_velocity", "cm h-1", "transfer velocity with the resistance of both sides", of_gas=True)

# Flux and time.
term("open_water_fraction", "1", "fraction of the surface free of ice")
term(
    "bubble_injection",
    "mmol m-2 d-1",
    "flux into open water from bubbles, whatever the concentration there",
    constant=0.0,
    of_gas=True,
)
term("evasion", "mmol m-2 d-1", "one-way flux out of the water, never negative", of_gas=True)
term("invasion", "mmol m-2 d-1", "one-way flux into the water, never negative", of_gas=True)
term("flux", "mmol m-2 d-1", "net flux through the surface, signed as `positive` says", of_gas=True)
term("storage_ratio", "1", "change of the stored substance over change of the dissolved gas")
term("equilibration_time", "d", "e-folding time of a disequilibrium of the mixed layer")
term("half_time", "d", "time in which a disequilibrium is halved")
term("time_to_fraction", "d", "time in which `fraction` of a disequilibrium is gone")

side(
    "water_side",
    (
        "water_mole_fraction",
        "water_mole_fraction_wet",
        "water_partial_pressure",
        "water_fugacity",
        "water_concentration",
        "water_saturation",
        "dissolved_inorganic_carbon",
        "ph",
    ),
    "what is known of the gas in the water",
    dissolved_inorganic_carbon="alkalinity",
    ph="alkalinity",
)
side(
    "air_side",
    ("air_mole_fraction", "air_mole_fraction_wet", "air_partial_pressure", "air_fugacity"),
    "what is known of the gas in the air",
)
side("pressure", ("air_pressure", "elevation"), "what is known of the pressure")
side(
    "own_transfer_velocity",
    ("given_transfer_velocity", "given_transfer_velocity_600", "given_transfer_velocity_660"),
    "the caller's own transfer velocity",
)

family("solubility", "solubility_method", "solubility of the gas", ("solubility", "solubility_per_litre"))
family("fugacity", "fugacity_method", "non-ideality of the gas in air", ("fugacity_coefficient",), "none")
family("schmidt_number", "schmidt_method", "Schmidt number of the gas", ("schmidt_number",))
family(
    "diffusivity_in_fresh_water",
    "diffusivity_method",
    "diffusivity of the gas in fresh water",
    ("diffusivity_in_fresh_water",),
)
family(
    "wind_profile",
    "wind_profile",
    "wind speed at 10 m from the measured one",
    ("wind_speed_10m", "friction_velocity_air"),
    default="smith-1988",
    told=True,
)
family(
    "transfer_velocity",
    "parameterisation",
    "transfer velocity on the water side",
    (
        "transfer_velocity_at_reference",
        "reference_schmidt_number",
        "schmidt_exponent",
        "transfer_velocity_without_rain",
        "transfer_velocity",
        "bubble_injection_per_atmosphere",
        "bubble_injection",
    ),
    default="wanninkhof-2014",
    given_by="own_transfer_velocity",
    told=True,
)
family(
    "air_side",
    "air_side_resistance",
    "resistance on the air side of the interface",
    ("total_transfer_velocity",),
    default="none",
    told=True,
)
family("direction", "positive", "the direction counted as positive", ("flux",), default="upward")
