"""The public face and the tree of errors."""

import types

import pytest

import crossbank
from crossbank import contract, errors
from crossbank.contract import FieldProblem, Problem
from crossbank.contract.problem import CODES
from crossbank.errors import (
    BY_CODE,
    ApiError,
    CrossbankError,
    Overloaded,
    ServerError,
    error_class,
    error_from,
)


@pytest.mark.parametrize("package", [crossbank, contract])
def test_all_names_exactly_what_is_public(package: types.ModuleType) -> None:
    """`__all__` holds every public name of the package and no other."""
    public = {
        name
        for name, value in vars(package).items()
        if not name.startswith("_") and not isinstance(value, types.ModuleType)
    }
    listed = set(package.__all__)
    modules = {name for name in listed if isinstance(getattr(package, name), types.ModuleType)}
    assert listed - modules - {"__version__"} == public
    assert len(package.__all__) == len(listed)


def test_every_code_of_the_contract_has_an_error_and_no_other() -> None:
    """The map from codes to errors is total both ways, one class a code."""
    assert set(BY_CODE) == set(CODES)
    assert len(set(BY_CODE.values())) == len(BY_CODE)


def test_the_tree_is_drawn_as_it_is() -> None:
    """Every error class of the module is in the drawing at its top, and the codes beside it are right."""
    drawn = errors.__doc__ or ""
    for name, value in vars(errors).items():
        if isinstance(value, type) and issubclass(value, CrossbankError):
            assert name in drawn
    for code, kind in BY_CODE.items():
        line = next(line for line in drawn.splitlines() if f" {kind.__name__} " in line)
        assert line.split()[-2:] == [code, str(CODES[code][0])]


@pytest.mark.parametrize("status", range(400, 600))
def test_every_status_of_failure_has_an_error(status: int) -> None:
    """A code of tomorrow still becomes an ApiError, by its status."""
    assert issubclass(error_class("a-code-of-tomorrow", status), ApiError)
    assert issubclass(error_class(None, status), ApiError)


@pytest.mark.parametrize("code", sorted(CODES))
def test_statuses_fall_back_to_the_family_of_the_code(code: str) -> None:
    """The class for a bare status is one of the classes that status has by code."""
    status = CODES[code][0]
    family = {BY_CODE[c] for c, (s, _) in CODES.items() if s == status}
    assert error_class(None, status) in family


def test_unknown_failures_of_the_server_are_server_errors() -> None:
    """A gateway's 502 is the server's failure; 503 is taken as busy."""
    assert error_class(None, 502) is ServerError
    assert error_class(None, 503) is Overloaded


def test_an_error_says_what_and_where() -> None:
    """The text of an error names the detail, the code, each pointer and the request."""
    problem = Problem(
        type="/problems/invalid-input",
        title="t",
        status=422,
        code="invalid-input",
        detail="One member is wrong.",
        errors=[FieldProblem(pointer="/outside/inlet_temperature_k", detail="It is in kelvin.", given=25)],
    )
    error = error_from(problem, "r-1")
    assert type(error) is errors.InvalidInput
    assert (error.status, error.code, error.request_id) == (422, "invalid-input", "r-1")
    for part in ("One member is wrong.", "invalid-input", "/outside/inlet_temperature_k", "kelvin", "r-1"):
        assert part in str(error)
