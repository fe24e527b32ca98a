"""The yearly list as a workbook."""

from fleet.reports.workbook.package import write_derating

__all__ = ["write_derating"]
