"""Stillcold: how long cold stores stay inside their safe limits when the power fails."""
