"""In-service rule sets as dated data files, each value with its clause and status, and their loader."""

from fleet.rules.loader import DESIGN_CODES, RuleSet, RuleValue, load_rule_set, rule_set_names, rule_status

__all__ = ["DESIGN_CODES", "RuleSet", "RuleValue", "load_rule_set", "rule_set_names", "rule_status"]
