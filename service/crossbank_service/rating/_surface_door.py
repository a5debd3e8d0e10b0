"""Surfaces at the door: tubes, fins and row groups, checked against each other, as plain numbers."""

import itertools
import math
from dataclasses import dataclass, replace

import numpy as np

from crossbank.contract import Annular, Bank, Curve, Layout, Material, Plate, RowGroup, Serrated, Tube, given
from crossbank.contract.names import material_slug
from crossbank_service import properties
from crossbank_service.banks.fins_refusals import Refusal, fin_refusals, serration_refusals
from crossbank_service.rating._case import Curve as Points
from crossbank_service.rating._case import SectionInput, SurfaceKind
from crossbank_service.rating._faults import Faults

Fins = Annular | Serrated | Plate

NOWHERE: Points = ((300.0,), (1.0,))

BOND_BY_ATTACHMENT = {
    "tension-wound": 1e-4,
    "overlapped-foot": 7e-5,
    "embedded": 5e-6,
    "extruded": 1.5e-5,
    "brazed": 0.0,
    "welded": 0.0,
}
"""Typical resistance between fin and tube on the bare tube [m2 K/W] (from memory; a factor of 2 either way)."""

DEEP_CAVITY_DIAMETERS = 10.0

TOUCHING = 1e-9
"""Fin tips may touch; sums of written-out millimetres miss equality by rounding."""


@dataclass(frozen=True)
class _Rows:
    """One row group: its rows from 0, what stands in them, and where that is written in the request."""

    first: int
    last: int
    tube: Tube
    fins: Fins | None
    tube_pointer: str
    fins_pointer: str


def sections_of(bank: Bank, faults: Faults) -> tuple[SectionInput, ...]:
    """The rows of a bank by their surfaces, first row first; faults are collected."""
    groups = _groups(bank, faults)
    bore = bank.tube.outer_diameter_m - 2.0 * bank.tube.wall_thickness_m
    for group in groups:
        own = group.tube.outer_diameter_m - 2.0 * group.tube.wall_thickness_m
        if abs(own - bore) > 1e-9:
            faults.refuse(
                f"{group.tube_pointer}/wall_thickness_m",
                f"The bore {own:.6g} m differs from that of the bank's tube, {bore:.6g} m: rows of different bores do "
                "not share a stream evenly and are not rated.",
                group.tube.wall_thickness_m,
                "m",
            )
    sections = (_section(bank.layout, group, faults) for group in groups)
    return tuple(piece for section in sections for piece in _parted(bank, section, faults))


def _parted(bank: Bank, section: SectionInput, faults: Faults) -> list[SectionInput]:
    """A section cut at the cavities within it.

    Behind a cavity of ten diameters or more the stream has calmed and the correlations count rows anew; nearer bundles
    count on, since their wakes still meet.
    """
    starts = _bundles(bank, faults)
    edges = [section.first, *(s for s, _, _ in starts if section.first < s < section.last), section.last]
    out = []
    for first, last in itertools.pairwise(edges):
        begin, end = next((b, e) for s, b, e in reversed(starts) if s <= first)
        numbers = {**section.bank, "rows": float(end - begin), "covered_rows": float(last - first)}
        out.append(replace(section, first=first, last=last, bank=numbers, counted_from=begin))
    return out


def _bundles(bank: Bank, faults: Faults) -> list[tuple[int, int, int]]:
    """Where each bundle starts, and the first and last + 1 of the rows that are counted with it (from 0)."""
    rows, deep = bank.layout.rows, DEEP_CAVITY_DIAMETERS * bank.tube.outer_diameter_m
    cuts = [(0, True)]
    for i, cavity in enumerate(bank.layout.cavities or []):
        if not cuts[-1][0] < cavity.after_row < rows:
            faults.refuse(
                f"/bank/layout/cavities/{i}/after_row",
                f"Cavities follow each other between rows 1 and {rows}; this one stands after row {cavity.after_row}.",
                cavity.after_row,
                "1",
                at_least=cuts[-1][0] + 1,
                at_most=rows - 1,
            )
            return [(0, 0, rows)]
        cuts.append((cavity.after_row, cavity.depth_m >= deep))
    out = []
    for start, _ in cuts:
        begin = max(c for c, anew in cuts if anew and c <= start)
        end = min((c for c, anew in cuts if anew and c > start), default=rows)
        out.append((start, begin, end))
    return out


def half_gap(section: SectionInput) -> float:
    """Half the clear gap between tubes, or fin tips, side by side [m]."""
    height = section.fins.get("height", 0.0)
    collar = 2.0 * section.fins["thickness"] if section.kind == "plate" else 0.0
    return 0.5 * (section.bank["transverse_pitch"] - section.bank["outer_diameter"] - collar - 2.0 * height)


def _groups(bank: Bank, faults: Faults) -> list[_Rows]:
    rows, main = bank.layout.rows, (bank.tube, bank.fins, "/bank/tube", "/bank/fins")
    out: list[_Rows] = []
    following = 0
    for i, group in enumerate(bank.row_groups or []):
        pointer = f"/bank/row_groups/{i}"
        if not following < group.first_row <= group.last_row <= rows:
            faults.refuse(
                f"{pointer}/first_row",
                f"Row groups follow each other within rows 1 to {rows}; this one runs from row {group.first_row} to "
                f"{group.last_row} after row {following}.",
                group.first_row,
                "1",
                at_least=following + 1,
                at_most=rows,
            )
            return [_Rows(0, rows, *main)]
        if group.first_row - 1 > following:
            out.append(_Rows(following, group.first_row - 1, *main))
        out.append(_group(bank, group, pointer))
        following = group.last_row
    if following < rows:
        out.append(_Rows(following, rows, *main))
    return out


def _group(bank: Bank, group: RowGroup, pointer: str) -> _Rows:
    tube, tube_pointer = (bank.tube, "/bank/tube") if group.tube is None else (group.tube, f"{pointer}/tube")
    return _Rows(group.first_row - 1, group.last_row, tube, group.fins, tube_pointer, f"{pointer}/fins")


def _section(layout: Layout, group: _Rows, faults: Faults) -> SectionInput:
    tube, fins = group.tube, group.fins
    kind: SurfaceKind = "plain" if fins is None else fins.__struct_config__.tag  # type: ignore[assignment]
    envelope = _envelope(tube, fins)
    if tube.wall_thickness_m >= 0.5 * tube.outer_diameter_m:
        faults.refuse(
            f"{group.tube_pointer}/wall_thickness_m",
            "The wall is as thick as the tube's radius or thicker: no bore is left.",
            tube.wall_thickness_m,
            "m",
            at_most=0.5 * tube.outer_diameter_m,
        )
    _overlaps(layout, envelope, tube.outer_diameter_m, fins is not None, faults)
    if fins is not None:
        _fin_faults(tube, fins, group.fins_pointer, faults)
    conductivity, density = metal(tube.material, f"{group.tube_pointer}/material", faults)
    fin_conductivity, fin_density = NOWHERE, 0.0
    if fins is not None:
        fin_conductivity, fin_density = metal(fins.material, f"{group.fins_pointer}/material", faults)
    gap = 0.5 * (layout.transverse_pitch_m - envelope)
    return SectionInput(
        first=group.first,
        last=group.last,
        kind=kind,
        bank={
            "staggered": 1.0 if layout.arrangement == "staggered" else 0.0,
            "transverse_pitch": layout.transverse_pitch_m,
            "longitudinal_pitch": layout.longitudinal_pitch_m,
            "rows": float(layout.rows),
            "tubes_per_row": float(layout.tubes_per_row),
            "tube_length": layout.tube_length_m,
            "side_gap": gap if layout.side_gap_m is None else layout.side_gap_m,
            "outer_diameter": tube.outer_diameter_m,
            "wall_thickness": tube.wall_thickness_m,
            "roughness": given(tube.roughness_m),
            "tube_density": density,
            "covered_rows": float(group.last - group.first),
        },
        fins={} if fins is None else {**_fin_numbers(fins), "density": fin_density},
        conductivity=conductivity,
        fin_conductivity=fin_conductivity,
        bond=bond(fins),
        attachment=None if fins is None or isinstance(fins, Plate) else fins.attachment,
        yaw=given(layout.yaw_rad),
    )


def bond(fins: Fins | None) -> float:
    """Resistance between fins and tube: the caller's, else typical of the attachment, else none [m2 K/W]."""
    if fins is None:
        return 0.0
    if fins.bond_resistance_m2_k_w is not None:
        return fins.bond_resistance_m2_k_w
    attachment = None if isinstance(fins, Plate) else fins.attachment
    return BOND_BY_ATTACHMENT[attachment] if attachment else 0.0


def _envelope(tube: Tube, fins: Fins | None) -> float:
    if fins is None:
        return tube.outer_diameter_m
    if isinstance(fins, Plate):
        return tube.outer_diameter_m + 2.0 * fins.thickness_m
    return tube.outer_diameter_m + 2.0 * fins.height_m


def _fin_numbers(fins: Fins) -> dict[str, float]:
    numbers = {
        "height": 0.0,
        "thickness": fins.thickness_m,
        "pitch": fins.pitch_m,
        "segment_width": 0.0,
        "cut_depth": 0.0,
    }
    if not isinstance(fins, Plate):
        numbers["height"] = fins.height_m
    if isinstance(fins, Serrated):
        numbers["segment_width"] = fins.segment_width_m
        numbers["cut_depth"] = fins.height_m if fins.cut_depth_m is None else fins.cut_depth_m
    return numbers


def _fin_faults(tube: Tube, fins: Fins, pointer: str, faults: Faults) -> None:
    def one(value: float) -> np.typing.NDArray[np.float64]:
        return np.array([value])

    found = list(fin_refusals(fin_thickness=one(fins.thickness_m), fin_pitch=one(fins.pitch_m)))
    if isinstance(fins, Serrated):
        numbers = _fin_numbers(fins)
        found += serration_refusals(
            outer_diameter=one(tube.outer_diameter_m),
            fin_height=one(fins.height_m),
            segment_width=one(fins.segment_width_m),
            cut_depth=one(numbers["cut_depth"]),
        )
    for refusal in found:
        if refusal.where[0]:
            faults.refuse(
                f"{pointer}/{refusal.field}",
                refusal.detail,
                float(refusal.given[0]),
                "m",
                at_least=_limit(refusal, "at_least"),
                at_most=_limit(refusal, "at_most"),
            )


def _limit(refusal: Refusal, name: str) -> float | None:
    value = getattr(refusal, name)
    return None if value is None else float(value[0])


def _overlaps(layout: Layout, envelope: float, diameter: float, finned: bool, faults: Faults) -> None:
    """Refuse tubes, or the fins of neighbours, that stand in one another; bare tubes may not even touch."""
    st, sl = layout.transverse_pitch_m, layout.longitudinal_pitch_m
    what = "fins of tubes" if finned else "tubes"
    over = "the diameter over the fins" if finned else "the outer diameter"
    slack = -TOUCHING * envelope if finned else TOUCHING * envelope
    across, along = "/bank/layout/transverse_pitch_m", "/bank/layout/longitudinal_pitch_m"
    if st <= envelope + slack:
        faults.refuse(
            across,
            f"The {what} side by side touch or overlap: the transverse pitch must exceed {over}, {envelope:.6g} m.",
            st,
            "m",
            at_least=envelope,
        )
    if layout.rows == 1:
        return
    if layout.arrangement == "inline":
        if sl <= envelope + slack:
            faults.refuse(
                along,
                f"The {what} behind each other touch or overlap: the longitudinal pitch must exceed {over}, "
                f"{envelope:.6g} m.",
                sl,
                "m",
                at_least=envelope,
            )
        return
    diagonal = math.hypot(0.5 * st, sl)
    if diagonal <= envelope + slack:
        faults.refuse(
            along,
            f"The {what} of neighbouring rows touch or overlap: the diagonal pitch {diagonal:.6g} m must exceed "
            f"{over}, {envelope:.6g} m.",
            sl,
            "m",
            at_least=math.sqrt(max(envelope * envelope - 0.25 * st * st, 0.0)),
        )
    elif layout.rows > 2 and 2.0 * sl <= envelope + slack:
        faults.refuse(
            along,
            f"The {what} two rows apart stand behind each other and touch or overlap: twice the longitudinal pitch "
            f"must exceed {over}, {envelope:.6g} m.",
            sl,
            "m",
            at_least=0.5 * max(envelope, diameter),
        )


def metal(material: str | Material, pointer: str, faults: Faults) -> tuple[Points, float]:
    """Conductivity over temperature and density (0: unknown) of a named metal or the caller's own."""
    if isinstance(material, Material):
        k = material.conductivity_w_m_k
        curve = (tuple(k.temperature_k), tuple(k.value)) if isinstance(k, Curve) else ((300.0,), (k,))
        return curve, material.density_kg_m3 or 0.0
    records = {record.slug: record for record in properties.material_records()}
    record = records.get(material_slug(material))
    if record is None:
        faults.reject(
            pointer,
            f"'{material}' is not a material of this service; /v1/materials lists them, or give your own.",
            material,
            one_of=tuple(records),
        )
        return NOWHERE, 0.0
    return record.conductivity_w_m_k, record.density_kg_m3
