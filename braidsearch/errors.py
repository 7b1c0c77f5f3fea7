"""The errors that braidsearch raises; each message is one line fit for a user."""


class BraidsearchError(Exception):
    """Base class: catching it catches everything that braidsearch raises on purpose."""


class InputError(BraidsearchError, ValueError):
    """A braid, an option or a file that cannot be read.

    The message is one line; it names the offending text and says what was expected.
    """


class OutOfTimeError(BraidsearchError):
    """A computation that was asked to mind the time has been told to stop before its end."""


class CapacityError(BraidsearchError):
    """The input is well formed, but larger than the named method is built for."""
