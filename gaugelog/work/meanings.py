"""What a sign-off means, where the person gives it no words of their own."""

from __future__ import annotations

SUBMIT_MEANING = "I did or saw the work recorded here and submit it for review."
ACCEPT_MEANING = "I reviewed this record against its criteria and accept it."
HOLD_MEANING = "I looked at the work myself and let it go on."
REFUSAL_MEANING = "I looked at the work myself and send it back."
REPLACE_MEANING = "I decided that the gauge in place is given up and replaced."
WITHDRAW_MEANING = "I decided that this point is withdrawn."
RELEASE_MEANING = "I release this plan and its acceptance criteria for work."
SEEN_MEANING = "I looked at what the plan's revision changes here and let the work go on."
