"""What we tell a person about one store."""

from app.answers.answer import Answer, ItemAnswer, LimitAnswer
from app.answers.cautions import STANDING_NOTICE
from app.answers.hold_time import hold_time
from app.answers.limits_kept import PlainLimit, plain_limits
from app.answers.warming_up import warm_up

__all__ = [
    "STANDING_NOTICE",
    "Answer",
    "ItemAnswer",
    "LimitAnswer",
    "PlainLimit",
    "hold_time",
    "plain_limits",
    "warm_up",
]
