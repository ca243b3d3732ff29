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


@dataclass(frozen=True)
class Charpy:
    """energy in J, measured at temperature in °C; correlation by its published name."""

    energy: float
    temperature: float
    correlation: str


@dataclass(frozen=True)
class MasterCurve:
    """t0 in °C; probability : of a lower toughness, between 0 and 1."""

    t0: float
    probability: float


ToughnessModel = Fixed | ByTemperature | EnergyRelease | Charpy | MasterCurve


@dataclass(frozen=True)
class Conditions:
    """What a model is read at.

    temperature : °C, the lowest at which the peak can occur; None where it is not given
    elastic_modulus, yield_strength : MPa; poisson : dimensionless
    thickness : m, of the wall (diameter of a bar); None where the kind has none
    front : m, length of the crack front
    rate : "static", "intermediate" or "impact"; None where nothing is said of it
    """

    temperature: float | None
    elastic_modulus: float
    poisson: float
    yield_strength: float
    thickness: float | None = None
    front: float | None = None
    rate: str | None = None

    @property
    def size(self) -> float | None:
        """The length in m that meets weak spots: of the front, and no less than the thickness."""
        known = [one for one in (self.thickness, self.front) if one is not None]
        return max(known) if known else None
