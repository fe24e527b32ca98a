"""Where the data folders of the project are, in an installed wheel and in a checkout."""

from __future__ import annotations

from pathlib import Path

import fleet
from fleet.errors import OurFault


def data_folder(name: str) -> Path:
    """Find a data folder of the project.

    A wheel carries the folder inside the package, a checkout has it beside the package.

    Parameters
    ----------
    name : str
        Name of the folder: ``migrations`` or ``sample_data`` [text].

    Returns
    -------
    pathlib.Path

    Raises
    ------
    fleet.errors.OurFault
        When the folder is in neither place.

    Examples
    --------
    >>> data_folder("migrations").name
    'migrations'
    """
    package = Path(fleet.__file__).resolve().parent
    for folder in (package / name, package.parent / name):
        if folder.is_dir():
            return folder
    raise OurFault(
        f"installation in {package}", f"the folder '{name}' is missing", "install fleet-wallbook again"
    )
