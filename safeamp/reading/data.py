"""Where the data files are: inside an installed package, or beside pyproject.toml of a source tree."""

from pathlib import Path

from safeamp.complaints import Complaint, ReadingError

_PACKAGE = Path(__file__).resolve().parent.parent


def limits_folder(package: Path = _PACKAGE) -> Path:
    """Return the folder of the limits data.

    Parameters
    ----------
    package : Path
        Folder of the package; the default is the one that runs.

    Raises
    ------
    ReadingError
        If neither the package nor the source tree around it holds the data.
    """
    shipped = package / "_data" / "limits"
    if shipped.is_dir():
        return shipped
    beside = package.parent / "limits"
    # Only a source tree has pyproject.toml: a stray folder named limits in site-packages is not ours.
    if beside.is_dir() and (package.parent / "pyproject.toml").is_file():
        return beside
    text = "the limits that belong to the program are missing; install it again"
    raise ReadingError((Complaint(str(shipped), None, "", text),))


def device_folder() -> Path:
    """Return the folder of the generic devices that come with the program; see `limits_folder`."""
    return limits_folder() / "devices"
