"""Settings that every test shares."""

from hypothesis import HealthCheck, settings

# The same examples on every run and no clock: a failure must be seen again when the
# suite is run again. Found cases are pinned with @example beside the property.
settings.register_profile(
    "benchlay",
    derandomize=True,
    deadline=None,
    max_examples=50,
    database=None,
    suppress_health_check=[HealthCheck.too_slow],
)
settings.load_profile("benchlay")
