"""The one nomenclature of the house: name on the wire and in signatures, symbol, unit, meaning."""

from dataclasses import dataclass


@dataclass(frozen=True)
class Quantity:
    """One entry: name, symbol of the field, SI unit ('' for a bare number or word), meaning, plausible bounds."""

    name: str
    symbol: str
    unit: str
    meaning: str
    at_least: float = 0.0
    at_most: float = 1e12
    words: tuple[str, ...] = ()


_ENTRIES = (
    # outside, plain banks
    Quantity(
        "arrangement",
        "",
        "",
        "inline or staggered; in arrays 1 (true) for staggered, 0 for inline",
        0.0,
        1.0,
        ("inline", "staggered"),
    ),
    Quantity("transverse_pitch_ratio", "a", "", "transverse pitch over outer diameter", 1.0, 20.0),
    Quantity("longitudinal_pitch_ratio", "b", "", "longitudinal pitch over outer diameter", 0.3, 20.0),
    Quantity("rows", "n", "", "rows along the outside stream", 1, 500),
    Quantity(
        "reynolds",
        "Re",
        "",
        "Reynolds number; outside: in the narrowest section, on the outer (root) diameter; inside: on the bore",
        0.0,
        1e9,
    ),
    Quantity(
        "prandtl", "Pr", "", "Prandtl number of the bulk (film, where the method's record says so)", 1e-4, 1e6
    ),
    Quantity("prandtl_wall", "Pr_w", "", "Prandtl number at the surface the fluid touches", 1e-4, 1e6),
    Quantity("gas", "", "", "true for a gas, false for a liquid"),
    Quantity("temperature_ratio", "T/T_w", "", "bulk over surface temperature, both in kelvin", 0.05, 20.0),
    Quantity(
        "viscosity_ratio", "mu_w/mu", "", "viscosity at the surface over viscosity of the bulk", 1e-4, 1e4
    ),
    Quantity(
        "nusselt",
        "Nu",
        "",
        "Nusselt number; outside on the outer (root) diameter, mean over the rows; inside on the bore",
    ),
    Quantity(
        "loss_coefficient",
        "xi",
        "",
        "pressure loss of one row resistance in velocity heads of the narrowest section",
    ),
    # outside, finned banks
    Quantity(
        "diameter_m",
        "d",
        "m",
        "outer (root; of plate fins the collar's) diameter outside, bore inside",
        1e-4,
        1.0,
    ),
    Quantity("fin_height_m", "h", "m", "fin height from tube to tip", 0.0, 0.2),
    Quantity("fin_thickness_m", "t", "m", "fin thickness", 0.0, 0.02),
    Quantity("fin_pitch_m", "", "m", "fin pitch, centre to centre", 1e-4, 0.2),
    Quantity("transverse_pitch_m", "P_t", "m", "tube pitch across the outside stream", 1e-3, 2.0),
    Quantity("longitudinal_pitch_m", "P_l", "m", "tube pitch along the outside stream", 1e-3, 2.0),
    Quantity("segment_width_m", "w_s", "m", "width of one fin segment", 1e-4, 0.1),
    Quantity("cut_depth_m", "", "m", "depth of the cuts of a serrated fin from the tip", 0.0, 0.2),
    Quantity("gas_temperature_k", "T_g", "K", "mean temperature of the outside stream", 100.0, 3000.0),
    Quantity("fin_temperature_k", "T_f", "K", "mean temperature of the fin", 100.0, 3000.0),
    Quantity(
        "blocked_width_m", "", "m", "width of the outside stream one tube with its fins blocks", 0.0, 2.0
    ),
    Quantity("fin_conductivity_w_m_k", "k_f", "W/(m K)", "thermal conductivity of the fin", 1e-3, 1e4),
    Quantity("fin_efficiency", "eta", "", "mean over root temperature difference of a fin", 0.0, 1.0),
    Quantity("fin_area_share", "", "", "fin surface over the whole outside surface", 0.0, 1.0),
    Quantity(
        "saturation_enthalpy_slope_j_kg_k",
        "b",
        "J/(kg K)",
        "enthalpy of saturated moist air by temperature, per kg dry air",
        0.0,
        1e6,
    ),
    Quantity("heat_capacity_j_kg_k", "c_p", "J/(kg K)", "heat capacity of the outside stream", 1.0, 1e6),
    # inside, single phase
    Quantity("diameter_length_ratio", "D/L", "", "bore over heated length between mixings", 0.0, 1.0),
    Quantity("relative_roughness", "e/D", "", "wall roughness over bore", 0.0, 0.1),
    Quantity("friction_factor", "f", "", "Darcy friction factor"),
    # inside, condensing
    Quantity("quality", "x", "", "vapour mass fraction", 0.0, 1.0),
    Quantity("mass_flux_kg_m2_s", "G", "kg/(m2 s)", "mass flow over the bore's section", 0.0, 1e5),
    Quantity(
        "temperature_difference_k",
        "T_sat - T_w",
        "K",
        "saturation less inner surface temperature",
        0.0,
        1000.0,
    ),
    Quantity("liquid_density_kg_m3", "r_l", "kg/m3", "density of saturated liquid", 1.0, 5000.0),
    Quantity("vapour_density_kg_m3", "r_g", "kg/m3", "density of saturated vapour", 1e-5, 2000.0),
    Quantity("liquid_viscosity_pa_s", "m_l", "Pa s", "viscosity of saturated liquid", 1e-7, 100.0),
    Quantity("vapour_viscosity_pa_s", "m_g", "Pa s", "viscosity of saturated vapour", 1e-7, 1e-2),
    Quantity("liquid_conductivity_w_m_k", "k_l", "W/(m K)", "conductivity of saturated liquid", 1e-4, 1e3),
    Quantity("liquid_heat_capacity_j_kg_k", "c_l", "J/(kg K)", "heat capacity of saturated liquid", 1.0, 1e6),
    Quantity("latent_heat_j_kg", "h_fg", "J/kg", "heat of vaporisation", 1.0, 1e8),
    Quantity("surface_tension_n_m", "sigma", "N/m", "surface tension", 1e-6, 1.0),
    Quantity("reduced_pressure", "p_r", "", "pressure over critical pressure", 0.0, 1.0),
    Quantity("hydrocarbon", "", "", "true for hydrocarbons"),
    Quantity("vertical", "", "", "true for vertical tubes with downward flow, false for horizontal tubes"),
    Quantity("heat_transfer_coefficient_w_m2_k", "h", "W/(m2 K)", "heat transfer coefficient"),
    Quantity("pressure_gradient_pa_m", "dp/dz", "Pa/m", "frictional pressure gradient, positive"),
)

NOMENCLATURE = {q.name: q for q in _ENTRIES}
