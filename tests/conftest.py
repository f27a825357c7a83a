"""Settings shared by all tests.

The fuzz tests run about 1,000 cases in all as a rule, and 20,000 with ``--hypothesis-profile=extended``.
"""

from hypothesis import HealthCheck, settings

_COMMON = {
    "deadline": None,
    "derandomize": True,
    "suppress_health_check": [HealthCheck.too_slow, HealthCheck.function_scoped_fixture],
}
settings.register_profile("ordinary", max_examples=335, **_COMMON)
settings.register_profile("extended", max_examples=6_670, **_COMMON | {"derandomize": False})
settings.load_profile("ordinary")
