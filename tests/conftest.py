"""One profile for all property tests: repeatable, without deadlines on a noisy machine.

``HYPOTHESIS_PROFILE=explore`` draws new examples at each run, ten times as many.
"""

import os

from hypothesis import settings

settings.register_profile("repeatable", deadline=None, derandomize=True)
settings.register_profile("explore", deadline=None, max_examples=1000)
settings.load_profile(os.environ.get("HYPOTHESIS_PROFILE", "repeatable"))
