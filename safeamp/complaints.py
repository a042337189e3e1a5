"""What reading a file complains of: every problem at once, each with its place."""

from dataclasses import dataclass


@dataclass(frozen=True)
class Complaint:
    """One problem of one file.

    Parameters
    ----------
    path : str
        The file as the user named it.
    line : int or None
        Counted from 1; None when the problem has no line of its own (a missing key).
    key : str
        Dotted key such as ``supply.no_load``; empty when the whole file is meant.
    text : str
        What was found and what to write instead, one sentence.
    """

    path: str
    line: int | None
    key: str
    text: str


class ReadingError(Exception):
    """A file could not be read; carries every complaint, never only the first.

    Parameters
    ----------
    complaints : tuple of Complaint
        At least one, in the order of the file.
    """

    def __init__(self, complaints: tuple[Complaint, ...]) -> None:
        super().__init__(complaints)
        self.complaints = complaints

    def __str__(self) -> str:
        return "; ".join(f"{_place(complaint)}{complaint.text}" for complaint in self.complaints)


def _place(complaint: Complaint) -> str:
    line = "" if complaint.line is None else f":{complaint.line}"
    key = f"{complaint.key}: " if complaint.key else ""
    return f"{complaint.path}{line}: {key}"


class OptionsError(ValueError):
    """Options of a quick answer say too little, or contradict one another; one sentence says what to add."""
