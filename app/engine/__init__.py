"""March networks of heat-holding bodies through time, and read from a run when a limit is passed."""

from app.engine.crossings import MeanKinetic, Passed, Trace, passed_above, passed_below
from app.engine.march import ENGINE_VERSION, Precision, Run, march, march_many
from app.engine.network import Network, build_network

__all__ = [
    "ENGINE_VERSION",
    "MeanKinetic",
    "Network",
    "Passed",
    "Precision",
    "Run",
    "Trace",
    "build_network",
    "march",
    "march_many",
    "passed_above",
    "passed_below",
]
