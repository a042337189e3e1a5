"""The register of checks: one function a finding, under its permanent id."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

from safeamp.amplifier import Amplifier
from safeamp.findings import Measure, NotApplicable, Step
from safeamp.limits import Limits
from safeamp.quantities import Kind

CheckFunction = Callable[[Amplifier, Limits], Measure | NotApplicable | None]


@dataclass(frozen=True)
class Check:
    """A finding's id, its step, the kind of its value, whether it is read at the bench, and how it is computed.

    `unpowered` says that its readings are taken with the mains plug pulled, whatever fed the amplifier at the others.
    """

    id: str
    step: Step
    kind: Kind
    at_bench: bool
    run: CheckFunction
    unpowered: bool = False


CHECKS: dict[str, Check] = {}


def finding(
    identity: str, step: Step, kind: Kind, *, at_bench: bool = False, unpowered: bool = False
) -> Callable[[CheckFunction], CheckFunction]:
    """Register a check under the id of its finding."""

    def register(function: CheckFunction) -> CheckFunction:
        if identity in CHECKS:
            raise ValueError(f"{identity} is registered twice")
        CHECKS[identity] = Check(identity, step, kind, at_bench, function, unpowered)
        return function

    return register
