"""Write the yearly list for management."""

from __future__ import annotations

from pathlib import Path

from fleet.tasks.appraisals import Appraised


def write_yearly_list(appraised: Appraised, path: Path, *, units: str) -> None:
    """Write the yearly list as a workbook.

    Parameters
    ----------
    appraised : Appraised
        What the list is drawn from [-].
    path : pathlib.Path
        The workbook; one that is there is replaced as a whole or not at all [text].
    units : {'si', 'us'}
        Units of what is printed [text].

    Raises
    ------
    Refused
        If the folder is not there or the file cannot be written.
    """
    from fleet.reports.workbook import write_derating

    grounds = appraised.grounds
    write_derating(
        appraised.appraisal,
        path,
        units=units,
        settings=grounds.settings,
        rules=grounds.rules,
        program_version=grounds.program_version,
    )
