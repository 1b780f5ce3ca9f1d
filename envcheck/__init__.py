"""envcheck: U-factors of building envelopes held against user-supplied limit tables."""

from __future__ import annotations

__version__ = "0.1.0"
