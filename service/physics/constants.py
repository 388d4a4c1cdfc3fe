"""The physical constants that several calculations share, each with unit and source."""

STANDARD_ATMOSPHERE = 1013.25  # hPa, exact by definition
GAS_CONSTANT = 8.31446261815324  # J mol-1 K-1, exact since the SI of 2019 (CODATA 2018)
GAS_CONSTANT_LITRE_ATM = GAS_CONSTANT / 101.325  # L atm mol-1 K-1, from the two above
GAS_CONSTANT_CM3_ATM = 82.0575  # cm3 atm mol-1 K-1, as Weiss (1974) and Dickson et al. (2007) use it in the virial term
ZERO_CELSIUS = 273.15  # K, exact by definition
GRAVITY = 9.80665  # m s-2, standard acceleration, exact by definition
DRY_AIR_GAS_CONSTANT = 287.05287  # J kg-1 K-1, ICAO standard atmosphere (Doc 7488)
VAPOUR_DENSITY_DEFICIT = 0.378  # 1 minus the ratio of the molar masses of water and dry air, 18.015/28.964
MOLAR_VOLUME_IDEAL = 22.414  # L mol-1 at 0 degC and 1 atm: the volume to which a Bunsen coefficient refers
ABSOLUTE_SALINITY_PER_PRACTICAL = 35.16504 / 35.0  # g kg-1, reference composition, TEOS-10
T68_PER_T90 = 1.00024  # temperature on IPTS-68 over the one on ITS-90, degC, in the oceanographic range
METRES_PER_DAY = 0.24  # m d-1 in one cm h-1
CM_PER_HOUR = 3.6e5  # cm h-1 in one m s-1
SECONDS_PER_DAY = 86400.0
PASCALS_PER_HECTOPASCAL = 100.0
AIR_DENSITY = 1.2  # kg m-3, air at about 20 degC and 1 atm, common practice in the stress on the water
LITRES_PER_CUBIC_METRE = 1000.0
LN_2 = 0.6931471805599453  # natural logarithm of 2
LN_10 = 2.302585092994046  # natural logarithm of 10
