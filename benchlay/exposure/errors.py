"""What is raised when no exposure limit exists for a question."""

from __future__ import annotations


class OutOfRange(ValueError):
    """The limits are not defined here, and they are never extrapolated.

    The message is a plain sentence that can be shown to the user as it is.
    """
