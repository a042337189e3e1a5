"""Every runtime dependency has a lower bound that an environment can be made of."""

import tomllib

from tests.packaging.oldest import PROJECT, oldest


def test_every_dependency_has_its_oldest_version():
    declared = tomllib.loads(PROJECT.read_text(encoding="utf-8"))["project"]["dependencies"]
    assert [line.replace("==", ">=") for line in oldest()] == declared
    assert len(declared) == 8
