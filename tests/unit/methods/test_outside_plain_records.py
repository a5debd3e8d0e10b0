"""The records of the plain-bank methods, the registry and the range notes."""

import inspect
from dataclasses import fields

import numpy as np
import pytest
from tests.unit.methods.outside_plain_banks import DROP, HEAT, Quantities

from crossbank_service.methods import METHODS, DerivedLimit, Limit, Method, by_slug, in_range, in_role, method
from crossbank_service.methods.nomenclature import NOMENCLATURE

PLAIN = (*HEAT, *DROP)
BANK: Quantities = {
    "reynolds": np.full((3, 4), 2e4),
    "prandtl": np.full((3, 4), 0.7),
    "transverse_pitch_ratio": np.array([[1.5], [2.0], [4.0]]),
    "longitudinal_pitch_ratio": np.array([[1.5], [2.0], [2.0]]),
    "arrangement": np.array([[1.0], [0.0], [1.0]]),
    "rows": np.full((3, 1), 12.0),
    "gas": np.ones((3, 1)),
}


def _slug(record: Method) -> str:
    return record.slug


@pytest.mark.parametrize("record", PLAIN, ids=_slug)
def test_record_and_signature_name_the_same_quantities(record: Method) -> None:
    """Inputs are the parameters without default, options those with one, in the nomenclature's words."""
    parameters = inspect.signature(record.function).parameters.values()
    needed = tuple(p.name for p in parameters if p.default is inspect.Parameter.empty)
    optional = tuple(p.name for p in parameters if p.default is not inspect.Parameter.empty)
    assert needed == record.inputs
    assert optional == record.options
    assert {*needed, *optional, record.gives} <= set(NOMENCLATURE)


@pytest.mark.parametrize("record", PLAIN, ids=_slug)
def test_docstring_explains_every_parameter(record: Method) -> None:
    """Each parameter stands in the docstring, and the notes give a source or formula."""
    text = inspect.getdoc(record.function) or ""
    for name in (*record.inputs, *record.options):
        assert name in text
    assert "Notes" in text


@pytest.mark.parametrize("record", PLAIN, ids=_slug)
def test_limits_name_quantities_of_the_nomenclature(record: Method) -> None:
    """Every limit can be judged: a known quantity, at least one side, an arrangement the method has."""
    for limit in record.limits:
        assert limit.quantity in NOMENCLATURE
    every: tuple[Limit | DerivedLimit, ...] = (*record.limits, *record.derived_limits)
    for either in every:
        assert either.at_least is not None or either.at_most is not None
        assert either.arrangement in {None, *record.arrangements}
    assert 0.0 < record.standard_uncertainty_fraction <= record.scatter_fraction


@pytest.mark.parametrize("record", PLAIN, ids=_slug)
def test_range_is_judged_case_by_case_with_a_sentence_only_where_it_breaks(record: Method) -> None:
    """The mask has the shape of the quantities; a case has a note exactly when one of its places is out."""
    within, notes = in_range(record, BANK)
    assert within.shape == (3, 4)
    assert [note is not None for note in notes] == (~within.all(axis=1)).tolist()
    assert len(notes) == 3


def test_note_names_quantity_values_and_limit() -> None:
    """A person reads what was given and what would do."""
    record = method("outside_pressure_drop", "jakob-1938")
    within, notes = in_range(
        record, {"reynolds": np.array([[900.0, 1500.0], [3e3, 4e3]]), "rows": np.array([[4.0], [10.0]])}
    )
    assert within.tolist() == [[False, False], [True, True]]
    assert notes[0] == (
        "Outside the range of jakob-1938: Reynolds number 900 to 1500 is below 2000; rows 4 is below 10."
    )
    assert notes[1] is None


def test_limit_of_one_arrangement_leaves_the_other_alone() -> None:
    """A longitudinal pitch of 0.8 is within Gaddis & Gnielinski staggered, not in line."""
    record = method("outside_pressure_drop", "gaddis-gnielinski-1985")
    bank = {"reynolds": 1e4, "transverse_pitch_ratio": 2.5, "longitudinal_pitch_ratio": 0.8, "rows": 10.0}
    within, notes = in_range(record, {**bank, "arrangement": np.array([1.0, 0.0])})
    assert within.tolist() == [True, False]
    assert "longitudinal pitch ratio 0.8 is below 1.2" in (notes[1] or "")


def test_registry_holds_every_record_once() -> None:
    """By slug, by role, and both."""
    records = [record for records in METHODS.values() for record in records]
    assert len({(record.role, record.slug) for record in records}) == len(records)
    for record in records:
        assert method(record.role, record.slug) is record
        assert record in by_slug(record.slug)
        assert record in in_role(record.role)
    assert set(PLAIN) <= {record for record in records if "plain" in record.surfaces}


def test_unknown_method_is_refused_with_the_ones_there_are() -> None:
    """The message lists the slugs of the role."""
    with pytest.raises(KeyError, match=r"no method 'jakob-1939'.*jakob-1938"):
        method("outside_pressure_drop", "jakob-1939")
    assert by_slug("jakob-1939") == ()


def test_records_are_values() -> None:
    """Frozen, so no caller can change what the next one reads."""
    assert Method.__dataclass_params__.frozen  # type: ignore[attr-defined]
    assert "function" in {field.name for field in fields(Method)}
