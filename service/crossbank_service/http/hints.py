"""Sentences that tell a person what would be accepted, and what they probably meant."""

import difflib
import math
from collections.abc import Iterable

KELVIN_OFFSET = 273.15
PA_PER_BAR = 1e5
PA_PER_KPA = 1e3
MM_PER_M = 1e3


def number(value: float) -> str:
    """Write a number shortly, whole ones without a point."""
    if isinstance(value, float) and not math.isfinite(value):
        return "not-a-number" if math.isnan(value) else "infinity"
    if isinstance(value, int):
        return str(value) if value.bit_length() < 64 else f"an integer of {value.bit_length()} bits"
    return f"{value:.10g}"


def accepted(kind: str, unit: str | None, low: float | None, high: float | None) -> str:
    """Say what would be accepted: ``a number from 150 to 2500 K``."""
    text = kind
    if low is not None and high is not None:
        text += f" from {number(low)} to {number(high)}"
    elif low is not None:
        text += f", at least {number(low)}"
    elif high is not None:
        text += f", at most {number(high)}"
    return text + _spoken(unit)


def wrong_kind(name: str, noun: str, text: str | None, wanted: str) -> str:
    """Say that a member is of the wrong kind."""
    subject = name or "the body"
    sentence = f"{subject} must be {wanted}, not {noun}."
    if text is not None and "number" in wanted and _looks_like_number(text):
        sentence += " Write the number without quotation marks."
    if noun == "null":
        sentence += " Null is accepted only where a member has a default."
    return sentence


def number_out_of_bounds(
    name: str, given: float, unit: str | None, low: float | None, high: float | None, *, integer: bool
) -> str:
    """Say that a number lies outside its bounds and, where it shows, in which unit it was written."""
    subject = name or "the number"
    kind = "a whole number" if integer else "a number"
    if isinstance(given, float) and not math.isfinite(given):
        return f"{subject} must be {accepted(kind, unit, low, high)}; {number(given)} is not one."
    meant = _other_unit(subject, given, unit, low, high)
    if meant is not None:
        return meant
    return f"{subject} must be {accepted(kind, unit, low, high)}, not {number(given)}."


def unknown_member(name: str, names: Iterable[str]) -> str:
    """Say that an object has no such member, and which one was probably meant."""
    names = list(names)
    near = difflib.get_close_matches(name, names, n=1, cutoff=0.75)
    if near:
        return f"{name} is not a member here; did you mean {near[0]}?"
    return f"{name} is not a member here; there are: {', '.join(names)}."


def unknown_word(name: str, given: str | None, words: Iterable[object], noun: str) -> str:
    """Say that a word is not one of those accepted, and which one was probably meant."""
    accepted_words = [str(word) for word in words]
    sentence = f"{name or 'the value'} must be one of {', '.join(accepted_words)}; not {noun}."
    if given is not None:
        spelt = given.strip().lower().replace("_", "-").replace(" ", "-")
        near = difflib.get_close_matches(spelt, accepted_words, n=1, cutoff=0.6)
        if near:
            sentence += f" Did you mean {near[0]}?"
    return sentence


def _spoken(unit: str | None) -> str:
    return f" {unit}" if unit and unit != "1" else ""


def _looks_like_number(text: str) -> bool:
    try:
        return math.isfinite(float(text))
    except ValueError:
        return False


def _inside(value: float, low: float | None, high: float | None) -> bool:
    return (low is None or value >= low) and (high is None or value <= high)


def _other_unit(
    name: str, given: float, unit: str | None, low: float | None, high: float | None
) -> str | None:
    """Recognise a reading in Celsius, bar, millimetres or percent by the bounds it would then satisfy."""
    limits = accepted("it", unit, low, high).removeprefix("it from ")
    if (
        unit == "K"
        and low is not None
        and low > 0
        and given < low
        and _inside(given + KELVIN_OFFSET, low, high)
    ):
        kelvin = number(round(given + KELVIN_OFFSET, 6))
        seen = f"{number(given)} looks like a Celsius reading ({kelvin} K)"
        return f"{name} is in kelvin; {seen}. Accepted: {limits}."
    if unit == "Pa" and low is not None and 0 < given < low:
        # a few hundred of something read as kilopascal, less as bar: both are only a guess
        factor, word = (PA_PER_BAR, "bar") if given < 50 else (PA_PER_KPA, "kilopascal")
        if _inside(given * factor, low, high):
            pascal = number(given * factor)
            return (
                f"{name} is in pascal; {number(given)} looks like {word} ({pascal} Pa). Accepted: {limits}."
            )
    if unit == "m" and high is not None and given > high and _inside(given / MM_PER_M, low, high):
        metres = number(given / MM_PER_M)
        return (
            f"{name} is in metres; {number(given)} looks like millimetres ({metres} m). Accepted: {limits}."
        )
    if unit in {None, "", "1"} and low == 0 and high == 1 and 1 < given <= 100:
        share = number(given / 100)
        return f"{name} is a fraction from 0 to 1; {number(given)} looks like percent ({share})."
    return None
