"""fleet: thickness surveys, remaining life and the yearly derating list for a fleet of pressure vessels.

The tool computes and records; it does not decide. A licensed engineer and the authorised inspector do, under the
local code and law.
"""

__version__ = "0.1.0"
