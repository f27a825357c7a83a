"""The rules, one file each. ALL_RULES is their reading order, which is also that of equal findings."""

from checker.registry import Rule
from rules import spin_parity

ALL_RULES: tuple[Rule, ...] = (spin_parity.RULE,)
