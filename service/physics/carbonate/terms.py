"""The part of the vocabulary that tells of the carbonate system: alkalinity, carbon, pH and the constants."""

from service.physics.declare import derived, family, input_term, term

ALKALINITY = "alkalinity_per_kilogram"

# What is measured.
input_term(
    "alkalinity",
    "umol kg-1",
    "total alkalinity of the water, 0 for pure fresh water",
    possible=(-1.0e4, 1.0e6),
    per_litre="alkalinity_per_litre",
    dimension=ALKALINITY,
    scale=100.0,
    standard_name="sea_water_alkalinity_expressed_as_mole_equivalent",
    example=2310.0,
)
input_term(
    "dissolved_inorganic_carbon",
    "umol kg-1",
    "total dissolved inorganic carbon of the water: CO2, bicarbonate and carbonate; beside alkalinity it tells the "
    "carbon dioxide",
    possible=(0.0, 1.0e6),
    per_litre="dissolved_inorganic_carbon_per_litre",
    scale=100.0,
    example=2050.0,
)
input_term(
    "ph",
    "1",
    "pH of the water on the total scale at its temperature; beside alkalinity it tells the carbon dioxide",
    possible=(0.0, 14.0),
    standard_name="sea_water_ph_reported_on_total_scale",
    example=8.05,
)
input_term(
    "phosphate",
    "umol kg-1",
    "total phosphate of the water, for its share of the alkalinity",
    possible=(0.0, 1.0e5),
    default=0.0,
    per_litre="phosphate_per_litre",
    example=0.5,
)
input_term(
    "silicate",
    "umol kg-1",
    "total silicate of the water, for its share of the alkalinity",
    possible=(0.0, 1.0e5),
    default=0.0,
    per_litre="silicate_per_litre",
    scale=10.0,
    example=5.0,
)
term(
    "alkalinity_per_litre",
    "umol L-1",
    "total alkalinity of the water, per volume",
    possible=(-1.0e4, 1.0e6),
    dimension="alkalinity_per_litre",
    scale=100.0,
)
term(
    "dissolved_inorganic_carbon_per_litre",
    "umol L-1",
    "total dissolved inorganic carbon of the water, per volume",
    possible=(0.0, 1.0e6),
    scale=100.0,
)
term("phosphate_per_litre", "umol L-1", "total phosphate of the water, per volume", possible=(0.0, 1.0e5))
term("silicate_per_litre", "umol L-1", "total silicate of the water, per volume", possible=(0.0, 1.0e5), scale=10.0)

# Constants, on the total scale.
term("carbonic_acid_constant", "mol kg-1", "first dissociation constant of carbonic acid, K1")
term("bicarbonate_constant", "mol kg-1", "second dissociation constant of carbonic acid, K2")
term("boric_acid_constant", "mol kg-1", "dissociation constant of boric acid, KB")
term("water_ion_product", "mol2 kg-2", "ion product of water, KW")
term("bisulphate_constant", "mol kg-1", "dissociation constant of the bisulphate ion on the free scale, KS")
term("hydrogen_fluoride_constant", "mol kg-1", "dissociation constant of hydrogen fluoride, KF")
term("phosphoric_acid_constant", "mol kg-1", "first dissociation constant of phosphoric acid")
term("dihydrogen_phosphate_constant", "mol kg-1", "second dissociation constant of phosphoric acid")
term("hydrogen_phosphate_constant", "mol kg-1", "third dissociation constant of phosphoric acid")
term("silicic_acid_constant", "mol kg-1", "dissociation constant of silicic acid")
term("boron", "mol kg-1", "total boron of the water, by salinity")
term("sulphate", "mol kg-1", "total sulphate of the water, by salinity")
term("fluoride", "mol kg-1", "total fluoride of the water, by salinity")

# The system: by a carbon or a fugacity that another term stands for, and as it is in the water.
term("carbonate_carbon", "umol kg-1", "the total carbon that the carbonate system is solved for")
term("carbonate_fugacity", "uatm", "the fugacity of carbon dioxide that the carbonate system is solved for")
term("hydrogen_ion_by_carbon", "mol kg-1", "hydrogen ion from alkalinity and total carbon, total scale")
term("hydrogen_ion_by_fugacity", "mol kg-1", "hydrogen ion from alkalinity and fugacity, total scale")
term("fugacity_by_carbon", "uatm", "fugacity of carbon dioxide from alkalinity and total carbon")
term("carbon_by_fugacity", "umol kg-1", "total carbon from alkalinity and fugacity of carbon dioxide")
term("hydrogen_ion", "mol kg-1", "hydrogen ion in the water at its temperature, total scale")
term("other_alkalinity", "umol kg-1", "alkalinity of all but bicarbonate and carbonate at this hydrogen ion")
term("other_buffer", "umol kg-1", "fall of other_alkalinity over the relative rise of the hydrogen ion")
term("revelle_factor", "1", "relative change of the fugacity over that of total carbon at constant alkalinity")
term("carbon_at_equilibrator", "umol kg-1", "total carbon of the water in the equilibrator")
term("carbon_before_headspace", "umol kg-1", "total carbon in a bottle before its headspace was added")
term("fugacity_after_equilibrator", "uatm", "fugacity in situ of the total carbon in the equilibrator")
term("hydrogen_ion_of_pair", "mol kg-1", "hydrogen ion from alkalinity and total carbon of the water")
term("carbon_at_equilibrator_below_takahashi", "umol kg-1", "the same, only where takahashi-1993 is not the default")
term("salinity_below_takahashi", "1", "salinity where takahashi-1993 is not the default, no number elsewhere")
term("fugacity_after_equilibrator_below_takahashi", "uatm", "the same, only where takahashi-1993 is not the default")
term("hydrogen_ion_of_water_side", "mol kg-1", "hydrogen ion from alkalinity and the fugacity in the water")
term("fugacity_of_water_side", "uatm", "fugacity from alkalinity and total carbon of the water")
term("fugacity_before_headspace", "uatm", "fugacity in situ of the total carbon before the headspace was added")

IN_THE_EQUILIBRATOR = {"water_temperature": "equilibrator_temperature"}
derived("hydrogen_ion_of_water_side", of="hydrogen_ion_by_fugacity", carbonate_fugacity="fugacity_in_water")
derived("fugacity_of_water_side", of="fugacity_by_carbon", carbonate_carbon="dissolved_inorganic_carbon")
derived(
    "carbon_at_equilibrator",
    of="carbon_by_fugacity",
    carbonate_fugacity="fugacity_at_equilibrator",
    **IN_THE_EQUILIBRATOR,
)
derived("hydrogen_ion_of_pair", of="hydrogen_ion_by_carbon", carbonate_carbon="dissolved_inorganic_carbon")
derived(
    "carbon_at_equilibrator_below_takahashi",
    of="carbon_by_fugacity",
    carbonate_fugacity="fugacity_at_equilibrator",
    salinity="salinity_below_takahashi",
    **IN_THE_EQUILIBRATOR,
)
derived(
    "fugacity_after_equilibrator_below_takahashi",
    of="fugacity_by_carbon",
    carbonate_carbon="carbon_at_equilibrator_below_takahashi",
    salinity="salinity_below_takahashi",
)
derived("fugacity_after_equilibrator", of="fugacity_by_carbon", carbonate_carbon="carbon_at_equilibrator")
derived("fugacity_before_headspace", of="fugacity_by_carbon", carbonate_carbon="carbon_before_headspace")

family(
    "carbonate_constants",
    "carbonate_constants",
    "dissociation constants of carbonic acid",
    ("carbonic_acid_constant", "bicarbonate_constant"),
    default="by-salinity",
    told=True,
)
family("total_boron", "total_boron", "total boron of sea water", ("boron",), default="lee-2010", told=True)
