"""Collecting what is wrong with a request, so that its sender reads all of it at once."""

from dataclasses import dataclass, field

from crossbank_service.errors import CoreError, Fault, Impossible, InvalidInput


@dataclass
class Faults:
    """Faults of one request: broken rules of the contract, and contradictions of physics or geometry."""

    invalid: list[Fault] = field(default_factory=list)
    impossible: list[Fault] = field(default_factory=list)

    def __bool__(self) -> bool:
        return bool(self.invalid or self.impossible)

    def refuse(
        self,
        pointer: str,
        detail: str,
        given: float | str | None = None,
        unit: str | None = None,
        *,
        at_least: float | None = None,
        at_most: float | None = None,
    ) -> None:
        """Note that physics or geometry contradict a member."""
        self.impossible.append(
            Fault(pointer=pointer, detail=detail, given=given, unit=unit, at_least=at_least, at_most=at_most)
        )

    def reject(
        self,
        pointer: str,
        detail: str,
        given: float | str | None = None,
        one_of: tuple[str, ...] | None = None,
    ) -> None:
        """Note that a member breaks a rule of the contract."""
        self.invalid.append(Fault(pointer=pointer, detail=detail, given=given, one_of=one_of))

    def error(self) -> CoreError:
        """All faults as one error; broken rules come before contradictions."""
        if self.invalid:
            return InvalidInput(_summary(self.invalid), [*self.invalid, *self.impossible])
        return Impossible(_summary(self.impossible), list(self.impossible))


def _summary(faults: list[Fault]) -> str:
    more = f" ({len(faults) - 1} more below)" if len(faults) > 1 else ""
    return faults[0].detail + more
