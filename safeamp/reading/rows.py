"""The rows of the limits data as nouns: each made when it is first asked for, or all at once with every complaint."""

from collections.abc import Callable, Iterator, Mapping
from pathlib import Path
from typing import Any, TypeVar

from safeamp.complaints import Complaint, ReadingError
from safeamp.quantities import QuantityError
from safeamp.reading.document import Document, read_document

Row = dict[str, Any]
_Path = tuple[str, ...]
_Noun = TypeVar("_Noun")


class Rows(Mapping[str, _Noun]):
    """Nouns by id, as a mapping that opens no file and makes no noun before it is asked for one.

    Parameters
    ----------
    files : mapping of str to Path
        First word of an id -> the file that it stands in; one entry under "" holds every id.
    mark : str
        The key that tells a row from a table around rows.
    make : callable
        Makes the noun of an id and a row.
    named : bool
        Whether ids lose the first word, which the rows of a table share.
    """

    def __init__(
        self, files: Mapping[str, Path], mark: str, make: Callable[[str, Row], _Noun], *, named: bool = False
    ) -> None:
        self._files, self._mark, self._make, self._named = files, mark, make, named
        self._tables: dict[str, tuple[Document, dict[str, tuple[_Path, Row]]]] = {}
        self._nouns: dict[str, _Noun] = {}

    def __getitem__(self, id: str) -> _Noun:
        """Return the noun of an id; raises ReadingError if its file or its row cannot be read."""
        if id not in self._nouns:
            document, rows = self._table("" if "" in self._files else id.partition(".")[0])
            path, row = rows[id]
            self._nouns[id] = self._noun(document, path, row)
        return self._nouns[id]

    def __iter__(self) -> Iterator[str]:
        """Yield every id, file by file."""
        for key in self._files:
            yield from self._table(key)[1]

    def __len__(self) -> int:
        """Return the number of rows in all files."""
        return sum(1 for _ in self)

    def complaints(self) -> Iterator[Complaint]:
        """Make every noun and yield what is wrong; raises ReadingError if a file cannot be read."""
        for id in self:
            try:
                self[id]
            except ReadingError as trouble:
                yield from trouble.complaints

    def _table(self, key: str) -> tuple[Document, dict[str, tuple[_Path, Row]]]:
        if key not in self._tables:
            document = read_document(self._files[key])
            self._tables[key] = (
                document,
                {
                    ".".join(path[1:] if self._named else path): (path, row)
                    for path, row in rows(document.data, self._mark)
                },
            )
        return self._tables[key]

    def _noun(self, document: Document, path: _Path, row: Row) -> _Noun:
        try:
            return self._make(".".join(path), row)
        except QuantityError as trouble:
            said = str(trouble)
        except KeyError as trouble:
            said = f"{trouble.args[0]} is missing"
        raise ReadingError((document.complaint(said, *path),))


def rows(table: Mapping[str, Any], mark: str, path: _Path = ()) -> Iterator[tuple[_Path, Row]]:
    """Walk to every table that holds the mark, and to every innermost one, so that none is passed over."""
    inner = {key: value for key, value in table.items() if isinstance(value, dict)}
    row = {key: value for key, value in table.items() if key not in inner}
    if path and (mark in row or not inner):
        yield path, row
    for key, value in inner.items():
        yield from rows(value, mark, (*path, key))
