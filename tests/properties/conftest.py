"""How the laws are tried: the same examples every time, without a clock and without a memory on disk."""

from hypothesis import HealthCheck, settings

settings.register_profile(
    "the same every time",
    derandomize=True,
    deadline=None,  # a busy machine is no fault of the code
    database=None,
    max_examples=10,  # each of them an array of many samples
    suppress_health_check=[HealthCheck.too_slow],
)
settings.load_profile("the same every time")
