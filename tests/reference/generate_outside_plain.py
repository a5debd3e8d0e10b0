"""Write outside_plain_precise.toml: plain-bank correlations in 40-digit decimal arithmetic.

A second writing of the published formulas, without arrays and without the service's code, evaluated away from
the joins that the service passes smoothly. Run by hand when a case is added:

    python tests/reference/generate_outside_plain.py > tests/reference/outside_plain_precise.toml
"""

import sys
from collections.abc import Callable, Iterator
from decimal import Decimal, getcontext

getcontext().prec = 40
D = Decimal
PI = D("3.14159265358979323846264338327950288419717")
ONE = D(1)

# a, b, staggered, rows
Bank = tuple[Decimal, Decimal, bool, int]


def power(base: Decimal, exponent: Decimal | str) -> Decimal:
    """Real power of a positive base."""
    return (D(exponent) * base.ln()).exp()


def diagonal(a: Decimal, b: Decimal) -> Decimal:
    """Diagonal pitch ratio."""
    return (a * a / 4 + b * b).sqrt()


def governs(a: Decimal, b: Decimal, staggered: bool, n: int) -> bool:
    """Whether the diagonal gap is the narrowest."""
    return staggered and n > 1 and 2 * (diagonal(a, b) - 1) < a - 1


def gnielinski(re: Decimal, pr: Decimal, bank: Bank) -> Decimal:
    """Gnielinski 1979 with K = 1, from Re in the narrowest section, on the diameter."""
    a, b, staggered, n = bank
    a, b, staggered, n = bank
    sigma = 2 * (diagonal(a, b) - 1) / a if governs(a, b, staggered, n) else (a - 1) / a
    psi = 1 - PI / (4 * a) if b >= 1 else 1 - PI / (4 * a * b)
    own = re * sigma * PI / 2 / psi
    laminar = D("0.664") * own.sqrt() * power(pr, ONE / 3)
    bracket = 1 + D("2.443") * power(own, "-0.1") * (power(pr, D(2) / 3) - 1)
    turbulent = D("0.037") * power(own, "0.8") * pr / bracket
    single = D("0.3") + (laminar**2 + turbulent**2).sqrt()
    if staggered:
        factor = 1 + 2 / (3 * b)
    else:
        factor = 1 + D("0.7") / power(psi, "1.5") * (b / a - D("0.3")) / (b / a + D("0.7")) ** 2
    mean = factor if n >= 10 else (1 + (n - 1) * factor) / n
    return mean * single * 2 / PI


def gaddis(re: Decimal, bank: Bank, ratio: Decimal) -> Decimal:
    """Gaddis & Gnielinski 1985 below Re 2.5e5."""
    a, b, staggered, n = bank
    a, b, staggered, n = bank
    c = diagonal(a, b)
    diagonal_case = governs(a, b, staggered, n)
    reference = c if diagonal_case else a
    laminar = 280 * PI * ((b.sqrt() - D("0.6")) ** 2 + D("0.75"))
    laminar /= (4 * a * b - PI) * power(reference, "1.6") * re
    laminar *= power(ratio, D("0.57") / power((4 * a * b / PI - 1) * re, "0.25"))
    if staggered:
        factor = D("2.5") + D("1.2") / power(a - D("0.85"), "1.08")
        factor += D("0.4") * (b / a - 1) ** 3 - D("0.01") * (a / b - 1) ** 3
        turbulent = factor / power(re, "0.25")
        onset = 1 - (-(re + 200) / 1000).exp()
    else:
        factor = D("0.22") + D("1.2") * power(1 - D("0.94") / b, "0.6") / power(a - D("0.85"), "1.3")
        factor = factor * power(D(10), D("0.47") * (b / a - D("1.5"))) + D("0.03") * (a - 1) * (b - 1)
        turbulent = factor / power(re, b / a / 10)
        onset = 1 - (-(re + 1000) / 2000).exp()
    end = D(0)
    if n < 10:
        end = (ONE / n - D("0.1")) * ((2 * (c - 1) / (a * (a - 1))) ** 2 if diagonal_case else 1 / a**2)
    return laminar + (turbulent * power(ratio, "0.14") + end) * onset


def euler(coefficients: tuple[str, ...], re: Decimal) -> Decimal:
    """Polynomial in 1/Re."""
    return sum((D(c) / re**i for i, c in enumerate(coefficients)), D(0))


def ulinskas_inline(re: Decimal, a: Decimal, b: Decimal) -> Decimal:
    """Zukauskas & Ulinskas in-line between b = 1.25 and 1.5, Re 1e4 to 1e5."""
    low = euler(("0.267", "2.49e3", "-9.27e6", "1.0e10"), re)
    high = euler(("0.235", "1.97e3", "-1.24e7", "3.12e10", "-2.74e13"), re)
    share = (b - D("1.25")) / D("0.25")
    x = (a - 1) / (b - 1)
    decade = re.log10() - 4
    k = D("1.007") * power(x, "-0.655") * (1 - decade) + D("1.004") * power(x, "-0.539") * decade
    return k * ((1 - share) * low.ln() + share * high.ln()).exp()


def ulinskas_staggered(re: Decimal, a: Decimal, b: Decimal) -> Decimal:
    """Zukauskas & Ulinskas staggered between a = 1.5 and 2, Re 1e4 to 1e5."""
    low = euler(("0.203", "2.48e3", "-7.58e6", "1.04e10", "-4.82e12"), re)
    high = euler(("0.162", "1.81e3", "7.92e7", "-1.65e12", "8.72e15"), re)
    share = (a - D("1.5")) / D("0.5")
    x = a / b
    slow = D("1.28") - D("0.708") / x + D("0.55") / x**2 - D("0.113") / x**3
    fast = D("2.016") - D("1.675") * x + D("0.948") * x**2 - D("0.234") * x**3 + D("0.021") * x**4
    decade = re.log10() - 4
    return (slow * (1 - decade) + fast * decade) * ((1 - share) * low.ln() + share * high.ln()).exp()


def jakob(re: Decimal, a: Decimal, b: Decimal, staggered: bool) -> Decimal:
    """Jakob 1938."""
    if staggered:
        return 4 * (D("0.25") + D("0.118") / power(a - 1, "1.08")) * power(re, "-0.16")
    exponent = D("0.43") + D("1.13") / b
    return 4 * (D("0.044") + D("0.08") * b / power(a - 1, exponent)) * power(re, "-0.15")


def gunter_shaw(re: Decimal, a: Decimal, b: Decimal) -> Decimal:
    """Gunter & Shaw 1945, turbulent branch."""
    v = 4 * a * b / PI - 1
    return 2 * D("0.96") * power(re * v, "-0.145") * b / v * power(v / a, "0.4") * power(b / a, "0.6")


_BANKS: tuple[tuple[str, str, bool, int], ...] = (
    ("2", "2", False, 10),
    ("1.4", "1.6", False, 4),
    ("1.5", "1.3", True, 5),
    ("3", "1", True, 8),
    ("2.5", "0.8", True, 1),
    ("1.25", "1.0825", True, 20),
)


def cases() -> Iterator[tuple[str, str, dict[str, object], Decimal]]:
    """Role, slug, inputs, expected."""
    for a, b, staggered, n in _BANKS:
        bank: dict[str, object] = {
            "transverse_pitch_ratio": float(a),
            "longitudinal_pitch_ratio": float(b),
            "arrangement": float(staggered),
        }
        for re, pr in (("300", "0.7"), ("12000", "6.5"), ("90000", "0.71")):
            value = gnielinski(D(re), D(pr), (D(a), D(b), staggered, n))
            given = {"reynolds": float(re), "prandtl": float(pr), **bank, "rows": n}
            yield "outside_heat_transfer", "gnielinski-1979", given, value
        for re, ratio in (("5", "1"), ("700", "0.6"), ("150000", "1.3")):
            value = gaddis(D(re), (D(a), D(b), staggered, n), D(ratio))
            given = {"reynolds": float(re), **bank, "rows": n, "viscosity_ratio": float(ratio)}
            yield "outside_pressure_drop", "gaddis-gnielinski-1985", given, value
        given = {"reynolds": 9000.0, **bank}
        yield "outside_pressure_drop", "jakob-1938", given, jakob(D(9000), D(a), D(b), staggered)
        given = {"reynolds": 9000.0, **bank}
        del given["arrangement"]
        yield "outside_pressure_drop", "gunter-shaw-1945", given, gunter_shaw(D(9000), D(a), D(b))
    laws: tuple[tuple[Callable[..., Decimal], str, str, bool], ...] = (
        (ulinskas_inline, "1.7", "1.4", False),
        (ulinskas_inline, "1.3", "1.3", False),
        (ulinskas_staggered, "1.8", "1.2", True),
        (ulinskas_staggered, "1.6", "1.9", True),
    )
    for law, a, b, staggered in laws:
        given = {
            "reynolds": 3e4,
            "transverse_pitch_ratio": float(a),
            "longitudinal_pitch_ratio": float(b),
            "arrangement": float(staggered),
            "rows": 12,
        }
        yield "outside_pressure_drop", "zukauskas-ulinskas-1988", given, law(D(30000), D(a), D(b))


def document() -> str:
    """Compose the reference file."""
    lines = [
        "# Written by generate_outside_plain.py; edit that, not this.",
        'why = "Both sides evaluate one formula; 1e-12 leaves room for rounding of some thirty operations."',
        "relative_tolerance = 1e-12",
    ]
    for role, slug, given, expected in cases():
        inputs = ", ".join(f"{name} = {value}" for name, value in given.items())
        lines += [
            "",
            "[[case]]",
            f'role = "{role}"',
            f'method = "{slug}"',
            f"inputs = {{ {inputs} }}",
            f"expected = {float(expected)!r}",
        ]
    return "\n".join(lines) + "\n"


if __name__ == "__main__":
    sys.stdout.write(document())
