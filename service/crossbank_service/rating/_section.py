"""Rows of one kind of outside surface: geometry, metals, the correlations that rate them, fin efficiency.

A bank is one section, or several where it has row groups, such as bare rows ahead of finned ones.
"""

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np

from crossbank_service.banks import TubeBank
from crossbank_service.methods import fin_efficiency, fin_efficiency_serrated
from crossbank_service.methods.finned_auto import fin_efficiency_of
from crossbank_service.methods.record import Method
from crossbank_service.properties import Curve
from crossbank_service.rating._arrays import Array, Cases, spread

_FIN = ("heat_transfer_coefficient_w_m2_k", "fin_conductivity_w_m_k")
_RING = (*_FIN, "diameter_m", "fin_height_m", "fin_thickness_m")
_EFFICIENCY_INPUTS = {
    "annular": _RING,
    "serrated": (*_RING, "segment_width_m", "cut_depth_m"),
    "plate": (
        *_FIN,
        "arrangement",
        "diameter_m",
        "fin_thickness_m",
        "transverse_pitch_m",
        "longitudinal_pitch_m",
    ),
}
_TIP: dict[str, Callable[..., Array]] = {
    "annular": fin_efficiency.annular_tip_ratio,
    "serrated": fin_efficiency_serrated.serrated_tip_ratio,
    "plate": fin_efficiency.plate_corner_ratio,
}


@dataclass(frozen=True)
class Section(Cases):
    """Rows ``first`` to ``last`` - 1 (from 0) of N banks; arrays (N,).

    Attributes
    ----------
    bank : TubeBank
        Their geometry; ``bank.rows`` counts the whole bank, ``bank.covered_rows`` these rows.
    metal, fin_metal : Curve
        Conductivity of tube and fins [W/(m K)]; None without fins.
    bond : Array
        Resistance between fin and tube on the bare tube [m2 K/W].
    heat_method, drop_method : Method
    yaw : Array
        Of the stream from the normal to the tubes [rad].
    counted_from : int
        Row (from 0) at which the correlations begin to count: behind a deep cavity they start anew.
    """

    first: int
    last: int
    bank: TubeBank
    metal: Curve
    fin_metal: Curve | None
    bond: Array
    heat_method: Method
    drop_method: Method
    yaw: Array
    counted_from: int = 0

    @property
    def heat_yaw(self) -> Array:
        """What yaw leaves of the film coefficient, cos(yaw)^0.6 (ESDU 73031), (N,)."""
        return np.asarray(np.cos(self.yaw) ** 0.6)

    @property
    def drop_yaw(self) -> Array:
        """What yaw leaves of the friction, cos(yaw)^1.8 (from memory), (N,)."""
        return np.asarray(np.cos(self.yaw) ** 1.8)

    @property
    def rows(self) -> slice:
        """The rows, for the second axis of an array."""
        return slice(self.first, self.last)

    def row_area(self, like: Array) -> Array:
        """Outside surface of each row [m2], (N, rows of the section, 1...)."""
        area = spread(self.bank.outside_area / self.bank.covered_rows, like)
        return np.broadcast_to(area, (like.shape[0], self.last - self.first, *([1] * (like.ndim - 2))))

    def fin_values(self, like: Array) -> dict[str, Array]:
        """The fins and what a finned correlation asks of the layout, by nomenclature names."""
        bank, own = self.bank, self.bank.fins
        assert own is not None
        members = {
            "diameter_m": bank.root_diameter,
            "fin_height_m": own.height,
            "fin_thickness_m": own.thickness,
            "fin_pitch_m": own.pitch,
            "segment_width_m": own.segment_width,
            "cut_depth_m": own.cut_depth,
            "transverse_pitch_m": bank.transverse_pitch,
            "longitudinal_pitch_m": bank.longitudinal_pitch,
        }
        return {name: spread(value, like) for name, value in members.items()}

    def efficiencies(self, film: Array, fin_temperature: Array) -> tuple[Array, Array]:
        """Fin efficiency and surface efficiency.

        Parameters
        ----------
        film : Array (N, ...)
            Coefficient on fin and tube, fouling included [W/(m2 K)].
        fin_temperature : Array (N, ...)
            Mean of the fins [K].
        """
        own = self.bank.fins
        if own is None:
            ones = np.ones((film.shape[0],) + (1,) * (film.ndim - 1))
            return ones, ones
        law = fin_efficiency_of(self.heat_method.slug, own.kind)
        efficiency = law(**self._conduction(film, fin_temperature))
        share = spread(self.bank.surface.fin_area_share, film)
        return efficiency, 1.0 - share * (1.0 - efficiency)

    def tip_ratio(self, film: Array, fin_temperature: Array) -> Array:
        """Temperature difference of the fin tip over that of the root (see ``efficiencies``)."""
        own = self.bank.fins
        if own is None:
            return np.ones_like(film)
        return _TIP[own.kind](**self._conduction(film, fin_temperature))

    def _conduction(self, film: Array, fin_temperature: Array) -> dict[str, Array]:
        own = self.bank.fins
        assert own is not None
        assert self.fin_metal is not None
        values = self.fin_values(film)
        values["arrangement"] = spread(self.bank.staggered, film)
        values["heat_transfer_coefficient_w_m2_k"] = film
        values["fin_conductivity_w_m_k"] = self.fin_metal(fin_temperature)
        return {name: values[name] for name in _EFFICIENCY_INPUTS[own.kind]}
