"""Random tests here are judged by what they find, not by the time that a busy machine takes."""

from hypothesis import settings

settings.register_profile("untimed", deadline=None)
settings.load_profile("untimed")
