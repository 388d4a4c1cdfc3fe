"""The part of the vocabulary that tells what instruments report: equilibrator, headspace, wet air, skin."""

from service.physics.declare import family, input_term, term

input_term(
    "air_mole_fraction_wet",
    "umol mol-1",
    "mole fraction of the gas in air as read without drying, with air_temperature and relative_humidity",
    possible=(0.0, 1.0e6),
    scale=100.0,
    of_gas=True,
    example=412.0,
)
input_term(
    "air_temperature",
    "degC",
    "temperature of the air whose mole fraction was read without drying",
    possible=(-60.0, 60.0),
    scale=10.0,
    example=17.0,
    used_with=("air_mole_fraction_wet",),
)
input_term(
    "relative_humidity",
    "%",
    "relative humidity of the air whose mole fraction was read without drying",
    possible=(0.0, 105.0),
    scale=100.0,
    example=78.0,
    used_with=("air_mole_fraction_wet",),
)
input_term(
    "water_mole_fraction_wet",
    "umol mol-1",
    "mole fraction of the gas in undried air in continuous equilibrium with the water",
    possible=(0.0, 1.0e6),
    scale=100.0,
    of_gas=True,
    example=372.0,
)
input_term(
    "equilibrator_temperature",
    "degC",
    "temperature at which air and water were in equilibrium; left out, that of the water in situ",
    possible=(-5.0, 60.0),
    scale=10.0,
    example=18.9,
    used_with=("water_mole_fraction", "water_mole_fraction_wet"),
)
input_term(
    "equilibrator_pressure",
    "hPa",
    "total pressure at which air and water were in equilibrium; left out, that at the surface",
    possible=(400.0, 1200.0),
    scale=1000.0,
    example=1009.5,
    used_with=("water_mole_fraction", "water_mole_fraction_wet"),
)
input_term(
    "headspace_ratio",
    "1",
    "volume of gas over volume of water in a closed bottle; 0 is the flow-through case",
    possible=(0.0, 1000.0),
    example=0.5,
    used_with=("water_mole_fraction", "water_mole_fraction_wet"),
)
input_term(
    "headspace_start_mole_fraction",
    "umol mol-1",
    "dry mole fraction of the gas in the headspace before it met the water",
    possible=(0.0, 1.0e6),
    default=0.0,
    scale=100.0,
    of_gas=True,
    example=0.0,
    used_with=("headspace_ratio",),
)
input_term(
    "water_saturation",
    "%",
    "concentration in the water in percent of air equilibrium at saturation_pressure",
    possible=(0.0, 1.0e5),
    scale=100.0,
    example=96.5,
)
input_term(
    "saturation_pressure",
    "hPa",
    "total pressure to which water_saturation refers; left out, that at the surface",
    possible=(400.0, 1200.0),
    scale=1000.0,
    example=1013.25,
    used_with=("water_saturation",),
)
input_term(
    "subskin_temperature",
    "degC",
    "temperature of the water just below the skin; left out, water_temperature",
    possible=(-5.0, 60.0),
    scale=10.0,
    example=18.3,
)
input_term(
    "skin_temperature",
    "degC",
    "temperature of the interface; left out, that below it less the cool skin of skin_correction",
    possible=(-5.0, 60.0),
    scale=10.0,
    example=18.1,
)

term("reacts_with_water", "1", "1 for a gas that forms other species in water, 0 for others", constant=0.0)
term("no_salt", "1", "the salinity of pure water", constant=0.0)
term("fugacity_coefficient_at_interface", "1", "fugacity over partial pressure at the temperature of the interface")
term("solubility_at_skin", "mol kg-1 atm-1", "solubility at the temperature of the interface")
term("solubility_per_litre_at_skin", "mol L-1 atm-1", "solubility at the temperature of the interface")
term("vapour_pressure_at_interface", "hPa", "pressure of water vapour at the temperature of the interface")
term("vapour_pressure_at_mast", "hPa", "saturation pressure of water vapour at the temperature of the air")
term("vapour_pressure_at_equilibrator", "hPa", "pressure of water vapour at the equilibrator's temperature")
term("dry_mole_fraction_in_air", "umol mol-1", "mole fraction of the gas in dry air", of_gas=True)
term("partial_pressure_at_equilibrator", "uatm", "partial pressure in the air of the equilibrator", of_gas=True)
term("fugacity_coefficient_at_equilibrator", "1", "fugacity over partial pressure in the equilibrator")
term("fugacity_at_equilibrator", "uatm", "fugacity in the equilibrator at its temperature", of_gas=True)
term("solubility_at_equilibrator", "mol kg-1 atm-1", "solubility at the temperature of the equilibrator")
term("solubility_per_litre_at_equilibrator", "mol L-1 atm-1", "solubility at the temperature of the equilibrator")
term("density_at_equilibrator", "kg m-3", "density of the water at the temperature of the equilibrator")
term("temperature_factor", "1", "fugacity at water_temperature over that at the equilibrator's", constant=1.0)
term("headspace_concentration", "umol L-1", "concentration in a bottle before its headspace was added", of_gas=True)
term("fugacity_in_air_of_bulk", "uatm", "fugacity of the gas in air over water without a cool skin", of_gas=True)
term("fugacity_in_air_of_saturation", "uatm", "fugacity in air at the pressure a saturation refers to", of_gas=True)

family("skin", "skin_correction", "cool skin of the interface", ("skin_temperature",), default="none")
family(
    "temperature_correction",
    "temperature_correction",
    "from the fugacity at the equilibrator's temperature to that at water_temperature",
    ("temperature_factor",),
    default="constant-concentration",
    told=True,
)
