"""Number types of the wire: one a unit and plausible range, each with both bounds and its ``x-unit``.

Bounds of request numbers refuse slips of unit (25 for a kelvin field, 25.4 for a metre field). Bounds of
result numbers are wide and finite: they say that a number is a number, they judge nothing.
"""

from typing import Annotated

from msgspec import Meta

# --- requests ---------------------------------------------------------------------------------------------

TemperatureK = Annotated[float, Meta(ge=150, le=2500, extra_json_schema={"x-unit": "K"})]
DifferenceK = Annotated[float, Meta(ge=0, le=1000, extra_json_schema={"x-unit": "K"})]
PressurePa = Annotated[float, Meta(ge=1e3, le=1e8, extra_json_schema={"x-unit": "Pa"})]
DiameterM = Annotated[float, Meta(ge=1e-3, le=0.5, extra_json_schema={"x-unit": "m"})]
WallThicknessM = Annotated[float, Meta(ge=5e-5, le=0.1, extra_json_schema={"x-unit": "m"})]
FinHeightM = Annotated[float, Meta(ge=0, le=0.2, extra_json_schema={"x-unit": "m"})]
FinThicknessM = Annotated[float, Meta(ge=2e-5, le=0.02, extra_json_schema={"x-unit": "m"})]
FinPitchM = Annotated[float, Meta(ge=2e-4, le=0.2, extra_json_schema={"x-unit": "m"})]
PitchM = Annotated[float, Meta(ge=1e-3, le=2, extra_json_schema={"x-unit": "m"})]
LengthM = Annotated[float, Meta(ge=0.01, le=100, extra_json_schema={"x-unit": "m"})]
GapM = Annotated[float, Meta(ge=0, le=2, extra_json_schema={"x-unit": "m"})]
RoughnessM = Annotated[float, Meta(ge=0, le=0.01, extra_json_schema={"x-unit": "m"})]
ElevationM = Annotated[float, Meta(ge=-500, le=9000, extra_json_schema={"x-unit": "m"})]
MassFlowKgS = Annotated[float, Meta(ge=0, le=1e5, extra_json_schema={"x-unit": "kg/s"})]
VolumeFlowM3S = Annotated[float, Meta(ge=0, le=1e5, extra_json_schema={"x-unit": "m3/s"})]
VelocityMS = Annotated[float, Meta(ge=0, le=300, extra_json_schema={"x-unit": "m/s"})]
FoulingM2KW = Annotated[float, Meta(ge=0, le=0.1, extra_json_schema={"x-unit": "m2 K/W"})]
GaugePressurePa = Annotated[float, Meta(ge=-1e5, le=1e8, extra_json_schema={"x-unit": "Pa"})]
Fraction = Annotated[float, Meta(ge=0, le=1, extra_json_schema={"x-unit": "1"})]
ExcessAir = Annotated[float, Meta(ge=0, le=100, extra_json_schema={"x-unit": "1"})]
FlueOxygen = Annotated[float, Meta(ge=0, le=0.2, extra_json_schema={"x-unit": "1"})]
HumidityRatio = Annotated[float, Meta(ge=0, le=5, extra_json_schema={"x-unit": "kg/kg"})]
LossCoefficient = Annotated[float, Meta(ge=0, le=1e4, extra_json_schema={"x-unit": "1"})]
MetalConductivity = Annotated[float, Meta(ge=0.01, le=1e4, extra_json_schema={"x-unit": "W/(m K)"})]
MetalDensity = Annotated[float, Meta(ge=100, le=25000, extra_json_schema={"x-unit": "kg/m3"})]
ElasticModulusPa = Annotated[float, Meta(ge=1e8, le=1e12, extra_json_schema={"x-unit": "Pa"})]
ExpansionPerK = Annotated[float, Meta(ge=-1e-5, le=1e-3, extra_json_schema={"x-unit": "1/K"})]
StressPa = Annotated[float, Meta(ge=1e5, le=1e10, extra_json_schema={"x-unit": "Pa"})]
FluidDensity = Annotated[float, Meta(ge=1e-5, le=25000, extra_json_schema={"x-unit": "kg/m3"})]
FluidHeatCapacity = Annotated[float, Meta(ge=10, le=1e6, extra_json_schema={"x-unit": "J/(kg K)"})]
FluidConductivity = Annotated[float, Meta(ge=1e-4, le=1e3, extra_json_schema={"x-unit": "W/(m K)"})]
FluidViscosity = Annotated[float, Meta(ge=1e-7, le=1e4, extra_json_schema={"x-unit": "Pa s"})]
FluidEnthalpy = Annotated[float, Meta(ge=-1e9, le=1e9, extra_json_schema={"x-unit": "J/kg"})]

Rows = Annotated[int, Meta(ge=1, le=200, extra_json_schema={"x-unit": "1"})]
TubesPerRow = Annotated[int, Meta(ge=1, le=2000, extra_json_schema={"x-unit": "1"})]
Passes = Annotated[int, Meta(ge=1, le=200, extra_json_schema={"x-unit": "1"})]
Strips = Annotated[int, Meta(ge=0, le=200, extra_json_schema={"x-unit": "1"})]
YawRad = Annotated[float, Meta(ge=0, le=1.3, extra_json_schema={"x-unit": "rad"})]
VelocityRatio = Annotated[float, Meta(ge=0.05, le=10, extra_json_schema={"x-unit": "1"})]
BypassFraction = Annotated[float, Meta(ge=0, le=0.95, extra_json_schema={"x-unit": "1"})]
Segments = Annotated[int, Meta(ge=1, le=400, extra_json_schema={"x-unit": "1"})]

Word = Annotated[str, Meta(min_length=1, max_length=80)]
Text = Annotated[str, Meta(min_length=1, max_length=400)]

# --- results ----------------------------------------------------------------------------------------------

Kelvin = Annotated[float, Meta(ge=0, le=1e6, extra_json_schema={"x-unit": "K"})]
KelvinDifference = Annotated[float, Meta(ge=-1e6, le=1e6, extra_json_schema={"x-unit": "K"})]
Watt = Annotated[float, Meta(ge=-1e15, le=1e15, extra_json_schema={"x-unit": "W"})]
Pascal = Annotated[float, Meta(ge=-1e15, le=1e15, extra_json_schema={"x-unit": "Pa"})]
KilogramPerSecond = Annotated[float, Meta(ge=-1e12, le=1e12, extra_json_schema={"x-unit": "kg/s"})]
MetrePerSecond = Annotated[float, Meta(ge=-1e12, le=1e12, extra_json_schema={"x-unit": "m/s"})]
KilogramPerM3 = Annotated[float, Meta(ge=0, le=1e9, extra_json_schema={"x-unit": "kg/m3"})]
KilogramPerM2S = Annotated[float, Meta(ge=0, le=1e15, extra_json_schema={"x-unit": "kg/(m2 s)"})]
WattPerM2K = Annotated[float, Meta(ge=0, le=1e15, extra_json_schema={"x-unit": "W/(m2 K)"})]
WattPerMK = Annotated[float, Meta(ge=0, le=1e9, extra_json_schema={"x-unit": "W/(m K)"})]
WattPerK = Annotated[float, Meta(ge=0, le=1e15, extra_json_schema={"x-unit": "W/K"})]
PerKelvin = Annotated[float, Meta(ge=-1, le=1, extra_json_schema={"x-unit": "1/K"})]
Metre = Annotated[float, Meta(ge=0, le=1e9, extra_json_schema={"x-unit": "m"})]
SquareMetre = Annotated[float, Meta(ge=0, le=1e12, extra_json_schema={"x-unit": "m2"})]
CubicMetre = Annotated[float, Meta(ge=0, le=1e12, extra_json_schema={"x-unit": "m3"})]
Kilogram = Annotated[float, Meta(ge=0, le=1e15, extra_json_schema={"x-unit": "kg"})]
Number = Annotated[float, Meta(ge=-1e300, le=1e300, extra_json_schema={"x-unit": "1"})]
AnyNumber = Annotated[float, Meta(ge=-1e300, le=1e300, description="Its unit stands in `unit`.")]
Count = Annotated[int, Meta(ge=0, le=10**12, extra_json_schema={"x-unit": "1"})]
