"""The models, as data. One frozen dataclass each."""

from dataclasses import dataclass


@dataclass(frozen=True)
class Fixed:
    """One value. k_mat in MPa√m, above 0."""

    k_mat: float


@dataclass(frozen=True)
class ByTemperature:
    """points : (temperature in °C, k_mat in MPa√m), temperatures rising."""

    points: tuple[tuple[float, float], ...]


@dataclass(frozen=True)
class EnergyRelease:
    """g_c in kJ/m², above 0; plane "stress" or "strain"."""

    g_c: float
    plane: str


ToughnessModel = Fixed | ByTemperature | EnergyRelease
