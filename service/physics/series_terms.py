"""The part of the vocabulary that tells of time: when a sample was taken, what a layer remembers, turnover."""

from service.physics.declare import family, input_term, side, term

input_term(
    "time",
    "d",
    "when the sample was taken: ISO 8601, UTC unless an offset is told, or days; increasing",
    possible=(-1.0e6, 1.0e7),
    holds="series",
    standard_name="time",
    example=1.0,
)
input_term(
    "times",
    "d",
    "increasing times from the beginning, at which the rest of a disequilibrium is told",
    possible=(0.0, 1.0e6),
    holds="course",
    example=10.0,
)
input_term(
    "ventilation_rate",
    "d-1",
    "part of the layer that is replaced from below in a unit of time, with water at equilibrium",
    possible=(0.0, 1.0e4),
    default=0.0,
    example=0.01,
)
input_term(
    "area",
    "m2",
    "area of the water for which a summary is told",
    possible=(0.0, 1.0e15),
    above_lower_limit=True,
    holds="request",
    example=2.5e6,
)

term("equilibration_rate", "d-1", "inverse of the e-folding time of a disequilibrium of the mixed layer")
term("disequilibrium", "1", "fraction of the initial disequilibrium that is left")
term("gaps_before", "1", "spacings before the sample that are longer than three median ones")
term("weighted_transfer_velocity", "cm h-1", "transfer velocity that the gas in the layer remembers, ice counted in")
term("ventilated_fraction", "1", "fraction of the mixed layer exchanged with the air within the memory")
term("memory_length", "d", "how far the series reaches back from the sample, within the memory of 60 days")
term("memory_exchange", "1", "how many times the mixed layer has been exchanged within the memory")
term("memory_gaps", "1", "spacings within the memory that are longer than three median ones")
term("gas_stock", "mmol m-2", "dissolved gas in the mixed layer, over its depth", of_gas=True)
term("turnover_one_way", "d", "stock of the dissolved gas over the one-way flux out of the water")
term("turnover_net", "d", "stock of the dissolved gas over the size of the net flux")

side("course", ("times", "time"), "when the disequilibrium is told")

family("course", "course", "how a disequilibrium decays", ("disequilibrium",), default="linear")
family(
    "wind_memory",
    "wind_memory",
    "how much each past wind counts for the gas in the layer",
    ("weighted_transfer_velocity", "ventilated_fraction"),
    default="reuer-2007",
    told=True,
)
