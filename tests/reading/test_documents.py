"""TOML files that cannot be read are told with file and line; complaints point to the nearest key."""

import pytest

from safeamp.complaints import Complaint, ReadingError
from safeamp.reading.document import parse_document, read_document


def test_line_of_a_key_or_of_the_table_around_it():
    document = parse_document('[mains]\nnominal = "230 V"\n', "amp.toml")
    assert document.line("mains", "nominal") == 2
    assert document.line("mains", "actual") == 1
    assert document.line("supply", "no_load") is None
    assert document.complaint("no", "mains", "nominal") == Complaint("amp.toml", 2, "mains.nominal", "no")


@pytest.mark.parametrize(
    ("text", "line", "said"),
    [
        ("[mains]\nnominal = 230 V\n", 2, "in quotes"),
        ("title = ", 1, "not valid TOML here (Invalid value, at the end of the file)"),
        ("a = 1\na = 2\n", 2, "overwrite"),
        ('a = "x\n', 1, "not valid TOML"),
    ],
)
def test_no_toml(text, line, said):
    with pytest.raises(ReadingError) as caught:
        parse_document(text, "amp.toml")
    [complaint] = caught.value.complaints
    assert (complaint.path, complaint.line) == ("amp.toml", line)
    assert said in complaint.text
    assert "(at " not in complaint.text


def test_missing_file(tmp_path):
    with pytest.raises(ReadingError, match=r"none\.toml: cannot be read: No such file or directory"):
        read_document(tmp_path / "none.toml")


def test_a_folder_is_no_file(tmp_path):
    with pytest.raises(ReadingError, match="is a folder; give a file"):
        read_document(tmp_path)


def test_bytes_that_are_no_utf8(tmp_path):
    path = tmp_path / "latin.toml"
    path.write_bytes('title = "±"\n'.encode("latin-1"))
    with pytest.raises(ReadingError, match=r"latin\.toml: is not a UTF-8 text; save it again as UTF-8"):
        read_document(path)


def test_a_byte_order_mark_is_passed_over(tmp_path):
    path = tmp_path / "marked.toml"
    path.write_bytes(b'\xef\xbb\xbftitle = "\xc2\xb1"\n')
    assert read_document(path).data == {"title": "±"}


def test_all_complaints_are_in_the_text_of_the_error():
    error = ReadingError(
        (Complaint("a.toml", 3, "mains.rated", "no unit"), Complaint("b.toml", None, "", "empty"))
    )
    assert str(error) == "a.toml:3: mains.rated: no unit; b.toml: empty"
