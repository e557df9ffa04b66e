"""Settings of all tests."""

from hypothesis import HealthCheck, settings

# A deadline is a hidden timed assertion: on two busy cores it fails now and then for no fault of the code.
settings.register_profile("rigslate", deadline=None, suppress_health_check=[HealthCheck.too_slow])
settings.load_profile("rigslate")
