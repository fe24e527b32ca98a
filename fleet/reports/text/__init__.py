"""Reports as plain text for the terminal: read from the top down like a letter."""

from fleet.reports.text.lists import appraise, derating, due, gaps, the_list, the_story
from fleet.reports.text.vessel import show

__all__ = ["appraise", "derating", "due", "gaps", "show", "the_list", "the_story"]
