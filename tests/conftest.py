"""What holds for all tests: one profile of property tests, and interrupts that interrupt.

Property tests are repeatable, and without deadlines on a noisy machine;
``HYPOTHESIS_PROFILE=explore`` draws new examples at each run, ten times as many. A shell lets what
it runs in the background ignore interrupts, and so would every process that is started here.
"""

import os
import signal

from hypothesis import settings

settings.register_profile("repeatable", deadline=None, derandomize=True)
settings.register_profile("explore", deadline=None, max_examples=1000)
settings.load_profile(os.environ.get("HYPOTHESIS_PROFILE", "repeatable"))

if signal.getsignal(signal.SIGINT) is signal.SIG_IGN:
    signal.signal(signal.SIGINT, signal.default_int_handler)
