"""The finned-tube correlations: against an independent library, at their edges, in their records."""

import inspect
from typing import Any

import numpy as np
import pytest
from fluids.geometry import AirCooledExchanger
from ht.air_cooler import (
    dP_ESDU_high_fin,
    dP_ESDU_low_fin,
    h_Briggs_Young,
    h_ESDU_high_fin,
    h_ESDU_low_fin,
    h_Ganguli_VDI,
)
from hypothesis import given, settings
from hypothesis import strategies as st

from crossbank_service.methods import finned_annular, finned_plate, finned_serrated
from crossbank_service.methods.fin_efficiency import annular_efficiency
from crossbank_service.methods.finned_annular import (
    briggs_young_1963,
    briggs_young_low_reynolds_blend,
    contraction_loss,
    esdu_84016,
    esdu_84016_drop,
    esdu_86022,
    esdu_86022_drop,
    ganguli_1985,
    robinson_briggs_1966,
    stasiulevicius_1988,
)
from crossbank_service.methods.finned_plate import (
    gray_webb_1986,
    gray_webb_1986_drop,
    wang_chi_chang_2000,
    wang_chi_chang_2000_drop,
)
from crossbank_service.methods.finned_serrated import weierman_1976, weierman_1976_drop
from crossbank_service.methods.nomenclature import NOMENCLATURE
from crossbank_service.methods.ranges import in_range
from crossbank_service.methods.record import Method

RECORDS = (*finned_annular.RECORDS, *finned_plate.RECORDS, *finned_serrated.RECORDS)

MU, RHO, CP, K_AIR, K_FIN = 1.85e-5, 1.161, 1007.0, 0.0263, 205.0
PR = CP * MU / K_AIR
FINS = {"fin_height_m": 0.0159, "fin_thickness_m": 0.000406, "fin_pitch_m": 0.002309}
TUBE = {"diameter_m": 0.0254, **FINS}
PITCHES = {"transverse_pitch_m": 0.06033, "longitudinal_pitch_m": 0.05207}
PLATE = {
    "diameter_m": 0.01023,
    "fin_thickness_m": 0.00013,
    "fin_pitch_m": 0.00212,
    "transverse_pitch_m": 0.0254,
    "longitudinal_pitch_m": 0.022,
}
WELDED = {
    "diameter_m": 0.0508,
    "fin_height_m": 0.015875,
    "fin_thickness_m": 0.00127,
    "fin_pitch_m": 1.0 / 177.0,
    "transverse_pitch_m": 0.1016,
    "longitudinal_pitch_m": 0.088,
}


def _cooler(rows: int, *, square: bool = False) -> Any:
    return AirCooledExchanger(
        tube_rows=rows,
        tube_passes=1,
        tubes_per_row=20,
        tube_length=3.0,
        tube_diameter=TUBE["diameter_m"],
        fin_thickness=TUBE["fin_thickness_m"],
        fin_density=1.0 / TUBE["fin_pitch_m"],
        fin_height=TUBE["fin_height_m"],
        pitch_normal=PITCHES["transverse_pitch_m"],
        pitch_parallel=PITCHES["transverse_pitch_m" if square else "longitudinal_pitch_m"],
        corbels=True,
    )


def _bare_coefficient(nusselt: Any, cooler: Any) -> float:
    """Film of a Nusselt number, with the exact fin efficiency, on the bare tube: what ht returns."""
    film = nusselt * K_AIR / TUBE["diameter_m"]
    eta = annular_efficiency(
        heat_transfer_coefficient_w_m2_k=film, fin_conductivity_w_m_k=K_FIN, diameter_m=0.0254, **_annulus()
    )
    return float(film * (eta * cooler.A_fin + cooler.A_tube_showing) / cooler.A_bare_tube)


def _annulus() -> dict[str, float]:
    return {name: FINS[name] for name in ("fin_height_m", "fin_thickness_m")}


def _ht_arguments(cooler: Any) -> dict[str, Any]:
    return {
        "m": 21.56,
        "A": cooler.A,
        "A_min": cooler.A_min,
        "A_increase": cooler.A_increase,
        "A_fin": cooler.A_fin,
        "A_tube_showing": cooler.A_tube_showing,
        "tube_diameter": cooler.tube_diameter,
        "fin_diameter": cooler.fin_diameter,
        "fin_thickness": cooler.fin_thickness,
        "bare_length": cooler.bare_length,
        "rho": RHO,
        "Cp": CP,
        "mu": MU,
        "k": K_AIR,
        "k_fin": K_FIN,
    }


def _reynolds(cooler: Any) -> float:
    return float(21.56 / cooler.A_min * cooler.tube_diameter / MU)


def test_briggs_young_equals_ht_with_the_exact_fin_efficiency() -> None:
    """From six rows, without a row factor, film and efficiency together are those of the ht library."""
    cooler = _cooler(6)
    nusselt = briggs_young_1963(reynolds=_reynolds(cooler), prandtl=PR, rows=6, **FINS)
    assert _bare_coefficient(nusselt, cooler) == pytest.approx(
        h_Briggs_Young(**_ht_arguments(cooler)), rel=1e-12
    )


@pytest.mark.parametrize("rows", [1, 2, 3, 4, 7])
def test_esdu_high_fin_equals_ht_by_rows(rows: int) -> None:
    """Heat transfer of ESDU 86022, film and efficiency, is that of the ht library for every row factor."""
    cooler = _cooler(rows)
    nusselt = esdu_86022(reynolds=_reynolds(cooler), prandtl=PR, rows=rows, **FINS, **PITCHES)
    theirs = h_ESDU_high_fin(
        **_ht_arguments(cooler),
        tube_rows=rows,
        pitch_normal=cooler.pitch_normal,
        pitch_parallel=cooler.pitch_parallel,
    )
    assert _bare_coefficient(nusselt, cooler) == pytest.approx(theirs, rel=1e-12)


@pytest.mark.parametrize(
    ("rows", "square"), [(1, False), (2, False), (3, False), (5, False), (3, True), (6, True)]
)
def test_ganguli_equals_ht_by_rows_and_arrangement(rows: int, square: bool) -> None:
    """The constants by rows and arrangement are those of the ht library, which reads square as in-line."""
    cooler = _cooler(rows, square=square)
    nusselt = ganguli_1985(
        reynolds=_reynolds(cooler), prandtl=PR, arrangement=0.0 if square else 1.0, rows=rows, **TUBE
    )
    theirs = h_Ganguli_VDI(
        **_ht_arguments(cooler),
        tube_rows=rows,
        pitch_normal=cooler.pitch_normal,
        pitch_parallel=cooler.pitch_parallel,
    )
    assert _bare_coefficient(nusselt, cooler) == pytest.approx(theirs, rel=1e-12)


def test_esdu_low_fin_equals_ht_without_row_factors() -> None:
    """From ten rows, where either row factor is 1, ESDU 84016 is that of the ht library."""
    cooler = _cooler(10)
    nusselt = esdu_84016(
        reynolds=_reynolds(cooler),
        prandtl=PR,
        rows=10,
        transverse_pitch_m=PITCHES["transverse_pitch_m"],
        **TUBE,
    )
    theirs = h_ESDU_low_fin(
        **_ht_arguments(cooler),
        tube_rows=10,
        pitch_normal=cooler.pitch_normal,
        pitch_parallel=cooler.pitch_parallel,
    )
    assert _bare_coefficient(nusselt, cooler) == pytest.approx(theirs, rel=1e-12)


def _drop(loss_per_row: Any, fixed: Any, rows: int, cooler: Any) -> float:
    flux = 21.56 / cooler.A_min
    return float((fixed + rows * loss_per_row) * flux**2 / (2.0 * RHO))


def test_esdu_drops_equal_ht() -> None:
    """Rows and fixed loss are those of ht, whose low-fin constant is 4.72 for the printed 4.71."""
    cooler = _cooler(4)
    # ht's face counts half a tube more than the rows have; per pitch, sigma is a_min over P_t
    sigma = cooler.A_min / (cooler.pitch_normal * cooler.tube_length * cooler.tubes_per_row)
    shared = {
        "m": 21.56,
        "A_min": cooler.A_min,
        "A_increase": cooler.A_increase,
        "flow_area_contraction_ratio": sigma,
        "tube_diameter": cooler.tube_diameter,
        "pitch_parallel": cooler.pitch_parallel,
        "pitch_normal": cooler.pitch_normal,
        "tube_rows": 4,
        "rho": RHO,
        "mu": MU,
    }
    fixed = contraction_loss(**TUBE, **PITCHES)
    high = esdu_86022_drop(reynolds=_reynolds(cooler), **TUBE, **PITCHES)
    assert _drop(high, fixed, 4, cooler) == pytest.approx(dP_ESDU_high_fin(**shared), rel=1e-12)
    low = esdu_84016_drop(reynolds=_reynolds(cooler), **TUBE, **PITCHES) * 4.72 / 4.71
    theirs = dP_ESDU_low_fin(**shared, fin_height=cooler.fin_height, bare_length=cooler.bare_length)
    assert _drop(low, fixed, 4, cooler) == pytest.approx(theirs, rel=1e-12)


def test_esdu_high_fin_drop_of_a_worked_bank() -> None:
    """Four rows at 6 kg/(m2 s), 1.1 kg/m3 and Re 8000 lose 82.2141 Pa by hand from the ESDU 86022 formula."""
    fins = {"diameter_m": 0.0254, "fin_height_m": 0.0127, "fin_thickness_m": 0.0004, "fin_pitch_m": 1 / 354}
    pitches = {"transverse_pitch_m": 0.0635, "longitudinal_pitch_m": 0.055}
    row = esdu_86022_drop(reynolds=8000.0, **fins, **pitches)
    fixed = contraction_loss(**fins, **pitches)
    assert float((fixed + 4 * row) * 36.0 / 2.2) == pytest.approx(82.2141, abs=5e-5)
    assert float(fixed) == pytest.approx(1.0 + 0.543360**2, abs=2e-6)


def test_robinson_briggs_recovers_its_equilateral_form() -> None:
    """With the diagonal equal to the transverse pitch, Eu = 18.93 Re^-0.316 (P_t/d)^-0.927 is left."""
    pitch = 0.0635
    loss = robinson_briggs_1966(
        reynolds=9000.0,
        diameter_m=0.0254,
        transverse_pitch_m=pitch,
        longitudinal_pitch_m=pitch * np.sqrt(0.75),
    )
    euler = 18.93 * 9000.0**-0.316 * (pitch / 0.0254) ** -0.927
    assert float(loss) == pytest.approx(2.0 * euler, rel=1e-12)


def test_weierman_layout_factors_are_one_at_their_reference_banks() -> None:
    """Ten rows, equilateral or square: the layout factors of j and f are 1 within their rounding."""
    ten = np.array([10.0, 10.0])
    quotient = np.array([np.sqrt(0.75), 1.0])
    staggered = np.array([True, False])
    assert finned_serrated._c5(quotient, ten, staggered) == pytest.approx(1.0, abs=0.007)
    assert finned_serrated._c6(quotient, ten, staggered) == pytest.approx(1.0, abs=0.015)


def test_weierman_single_row_has_no_arrangement_in_its_layout_factors() -> None:
    """One row in-line and one staggered differ by the fins' and the velocity's factors alone."""
    one = np.array([1.0])
    quotient = np.array([0.9])
    inline, staggered = np.array([False]), np.array([True])
    assert finned_serrated._c5(quotient, one, inline) == finned_serrated._c5(quotient, one, staggered)
    assert finned_serrated._c6(quotient, one, inline) == finned_serrated._c6(quotient, one, staggered)


def test_weierman_without_temperatures_has_no_temperature_factor() -> None:
    """Without temperatures gas and fin count as equally warm; hot gas raises j and lowers f."""
    case = {"reynolds": 12000.0, "arrangement": 1.0, "rows": 6.0, **WELDED}
    level = {"gas_temperature_k": 450.0, "fin_temperature_k": 450.0}
    hot = {"gas_temperature_k": 600.0, "fin_temperature_k": 500.0}
    assert weierman_1976(prandtl=0.7, **case) == weierman_1976(prandtl=0.7, **case, **level)
    assert weierman_1976(prandtl=0.7, **case, **hot) / weierman_1976(prandtl=0.7, **case) == pytest.approx(
        1.2**0.25
    )
    assert weierman_1976_drop(**case, **hot) / weierman_1976_drop(**case) == pytest.approx(1.2**-0.25)


def test_weierman_segment_width_zero_is_a_solid_fin() -> None:
    """In one array, a segment width of 0 gives the solid and a width the serrated constants, case by case."""
    case = {"reynolds": 12000.0, "prandtl": 0.7, "arrangement": 1.0, "rows": 6.0, **WELDED}
    both = weierman_1976(segment_width_m=np.array([0.0, 0.004]), **case)
    assert both[0] == weierman_1976(**case)
    assert both[1] == weierman_1976(segment_width_m=0.004, **case)
    assert both[1] > both[0]


def test_low_reynolds_blend_equals_its_parents_outside_the_passage() -> None:
    """Up to Re 500 and from 1000 the blend is one parent, bit for bit; between, it lies between them."""
    low, middle, high = (
        np.array([100.0, 499.0]),
        np.array([600.0, 700.0, 900.0]),
        np.array([1000.0, 5e3, 4e4]),
    )

    def parents(reynolds: Any) -> tuple[Any, Any, Any]:
        case = {"reynolds": reynolds, "prandtl": 0.71, "rows": 3.0}
        return (
            briggs_young_low_reynolds_blend(**case, **TUBE, **PITCHES),
            stasiulevicius_1988(**case, **TUBE, **PITCHES),
            briggs_young_1963(**case, **FINS),
        )

    assert np.array_equal(parents(low)[0], parents(low)[1])
    assert np.array_equal(parents(high)[0], parents(high)[2])
    blend, slow, fast = parents(middle)
    assert np.all((np.minimum(slow, fast) <= blend) & (blend <= np.maximum(slow, fast)))


def test_wall_factor_acts_on_liquids_only() -> None:
    """(Pr/Pr_w)^0.26 multiplies a liquid's Nusselt number and leaves a gas's alone."""
    case = {"reynolds": 8000.0, "prandtl": 6.0, "rows": 4, **FINS, **PITCHES}
    level = esdu_86022(**case)
    assert esdu_86022(**case, prandtl_wall=3.0, gas=0.0) / level == pytest.approx(2.0**0.26)
    assert esdu_86022(**case, prandtl_wall=3.0, gas=1.0) == level


@pytest.mark.parametrize("edge", [300.0, 2e4])
@pytest.mark.parametrize("rows", [1.0, 4.0])
def test_wang_goes_on_straight_beyond_its_range(edge: float, rows: float) -> None:
    """At the ends of Re 300 to 2e4 neither the value nor the slope in ln-ln jumps, for j and for f."""
    steps = np.array([0.999, 0.9999, 1.0001, 1.001]) * edge
    for values in (
        wang_chi_chang_2000(reynolds=steps, prandtl=0.7, rows=rows, **PLATE),
        wang_chi_chang_2000_drop(reynolds=steps, rows=rows, **PLATE),
    ):
        slopes = np.diff(np.log(values)) / np.diff(np.log(steps))
        assert slopes[0] == pytest.approx(slopes[2], abs=0.005)
        assert slopes[1] == pytest.approx(slopes[0], abs=0.005)


def test_wang_counts_more_than_six_rows_as_six() -> None:
    """The Nusselt number stands still beyond six rows."""
    case = {"reynolds": 2000.0, "prandtl": 0.7, **PLATE}
    assert wang_chi_chang_2000(rows=9.0, **case) == wang_chi_chang_2000(rows=6.0, **case)


def test_wang_and_gray_webb_agree_within_their_scatter() -> None:
    """At Re 3000, inside both data banks, two independent laws are no farther apart than 20 %."""
    rows = np.array([1.0, 2.0, 3.0, 4.0])
    case = {"reynolds": 3000.0, "prandtl": 0.7, "rows": rows, **PLATE}
    ratio = wang_chi_chang_2000(**case) / gray_webb_1986(arrangement=1.0, **case)
    assert np.all(np.abs(ratio - 1.0) < 0.20)


def test_inline_plates_are_reduced_staggered_ones() -> None:
    """In-line plates give 0.7 of the staggered Nusselt number and 0.6 of the staggered loss."""
    case = {"reynolds": 3000.0, "rows": 4.0, **PLATE}
    heat = [gray_webb_1986(prandtl=0.7, arrangement=a, **case) for a in (0.0, 1.0)]
    loss = [gray_webb_1986_drop(arrangement=a, **case) for a in (0.0, 1.0)]
    assert heat[0] / heat[1] == pytest.approx(0.7)
    assert loss[0] / loss[1] == pytest.approx(0.6)


@pytest.mark.parametrize("method", RECORDS, ids=lambda m: f"{m.role}-{m.slug}")
def test_inputs_of_the_record_are_the_parameters_of_the_function(method: Method) -> None:
    """Inputs have no default, options have one, and both stand in the nomenclature."""
    parameters = inspect.signature(method.function).parameters
    required = {name for name, p in parameters.items() if p.default is inspect.Parameter.empty}
    assert required == set(method.inputs)
    assert set(parameters) - required == set(method.options)
    assert set(parameters) <= set(NOMENCLATURE)


def _quantities(method: Method) -> dict[str, st.SearchStrategy[float]]:
    strategies = {}
    for name in (*method.inputs, *method.options):
        entry = NOMENCLATURE[name]
        if entry.words or name == "gas":
            strategies[name] = st.sampled_from([0.0, 1.0])
        else:
            strategies[name] = st.floats(entry.at_least, min(entry.at_most, 1e7), allow_subnormal=False)
    return strategies


@settings(max_examples=60, deadline=None)
@given(data=st.data())
@pytest.mark.parametrize("method", RECORDS, ids=lambda m: f"{m.role}-{m.slug}")
def test_every_method_stays_finite_and_positive_over_the_nomenclature(method: Method, data: Any) -> None:
    """Whatever the nomenclature admits, Re 0 and height 0 included, gives a positive finite number."""
    values = data.draw(st.fixed_dictionaries(_quantities(method)))
    result = method.function(**values)
    assert np.all(np.isfinite(result))
    assert np.all(result > 0.0)
    if method.fixed_loss is not None:
        fixed = method.fixed_loss(**values)
        assert np.all((fixed >= 1.0) & (fixed <= 2.0))
    in_range(method, values)


@pytest.mark.parametrize("method", RECORDS, ids=lambda m: f"{m.role}-{m.slug}")
def test_a_case_gives_the_same_bits_alone_and_among_others(method: Method) -> None:
    """A case computed alone equals the same case within a batch to the last bit."""
    rng = np.random.default_rng(20)
    size = 37
    batch = {"reynolds": rng.uniform(300.0, 4e4, size), "rows": rng.integers(1, 9, size).astype(np.float64)}
    batch |= {
        "prandtl": rng.uniform(0.6, 6.0, size),
        "arrangement": rng.integers(0, 2, size).astype(np.float64),
    }
    batch |= {"diameter_m": rng.uniform(0.01, 0.05, size), "fin_height_m": rng.uniform(0.001, 0.02, size)}
    batch |= {"fin_thickness_m": rng.uniform(1e-4, 1e-3, size), "fin_pitch_m": rng.uniform(2e-3, 6e-3, size)}
    batch |= {"transverse_pitch_m": rng.uniform(0.1, 0.13, size)}
    batch |= {"longitudinal_pitch_m": rng.uniform(0.09, 0.12, size)}
    inputs = {name: batch[name] for name in method.inputs}
    together = method.function(**inputs)
    alone = [float(method.function(**{name: v[i] for name, v in inputs.items()})) for i in range(size)]
    assert together.tolist() == alone


def test_nusselt_rises_and_loss_falls_with_reynolds() -> None:
    """Over four decades of Re every Nusselt number rises and every loss coefficient falls."""
    reynolds = np.geomspace(50.0, 5e5, 200)
    values = {**WELDED, "reynolds": reynolds, "prandtl": 0.7, "rows": 4.0, "arrangement": 1.0}
    for method in RECORDS:
        case = {**values, **PLATE} if "plate" in method.surfaces else values
        result = method.function(**{name: case[name] for name in method.inputs})
        sign = 1.0 if method.gives == "nusselt" else -1.0
        assert np.all(sign * np.diff(result) > 0.0), method.slug


def test_range_is_judged_by_fins_and_layout() -> None:
    """Diameter and pitch quotient outside Wang's data are both named; a fitting bank has no note."""
    wang = finned_plate.RECORDS[0]
    inside, notes = in_range(wang, {"reynolds": 2000.0, "prandtl": 0.7, "rows": 3.0, **PLATE})
    assert inside
    assert notes[0] is None
    wide = {**PLATE, "diameter_m": 0.02, "transverse_pitch_m": 0.031}
    inside, notes = in_range(wang, {"reynolds": 2000.0, "prandtl": 0.7, "rows": 3.0, **wide})
    assert not inside
    text = notes[0]
    assert text is not None
    assert "diameter" in text
    assert "transverse over longitudinal pitch" in text
