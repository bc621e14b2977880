"""Columns of a sweep: the varied entries, and the outcomes under the names ratings use."""

from __future__ import annotations

from dataclasses import dataclass, replace

from combustor.report import fields
from combustor.report.field import Field, select
from combustor.studies.sweep_axis import Axis


def _as(group: tuple[Field, ...], known: str, path: str, key: str = "", label: str = "") -> Field:
    field = select(group, known)[0]
    return replace(field, path=path, key=key or field.key, label=label or field.label)


@dataclass(frozen=True)
class Limits:
    """What NOx and CO may be: mole fractions, dry, 15 % O2; None where nothing is asked."""

    nox: float | None = None
    co: float | None = None

    @property
    def words(self) -> str:
        """Both in words."""
        pairs = (("NOx", self.nox), ("CO", self.co))
        return ", ".join(f"{n} {1e6 * v:.4g} ppm" for n, v in pairs if v is not None)


OUTCOME: dict[str, Field] = {
    "nox": _as(fields.EMISSIONS, "nox_ppmvd_15", "nox"),
    "co": _as(fields.EMISSIONS, "co_ppmvd_15", "co"),
    "n2o": _as(fields.EMISSIONS, "n2o_ppmvd_15", "n2o"),
    "ei_nox": _as(fields.EMISSIONS, "ei_nox_g_kg", "ei_nox"),
    "ei_co": _as(fields.EMISSIONS, "ei_co_g_kg", "ei_co"),
    "ei_uhc": _as(fields.EMISSIONS, "ei_uhc_g_kg", "ei_uhc"),
    "exit_temperature": _as(
        fields.EXIT,
        "temperature_K",
        "exit_temperature",
        key="exit_temperature_K",
        label="exit",
    ),
    "primary_temperature": _as(
        fields.ZONES,
        "temperature_K",
        "primary_temperature",
        key="primary_temperature_K",
        label="primary",
    ),
    "primary_equivalence_ratio": _as(
        fields.ZONES,
        "equivalence_ratio",
        "primary_equivalence_ratio",
        key="primary_equivalence_ratio",
        label="primary\nequiv.",
    ),
    "primary_air": _as(
        fields.ZONES,
        "air_percent",
        "primary_air",
        key="primary_air_percent",
        label="primary\nair",
    ),
    "primary_residence_time": _as(
        fields.ZONES,
        "residence_time_ms",
        "primary_residence_time",
        key="primary_residence_time_ms",
        label="primary\ntime",
    ),
    "pressure_loss": fields.LOSS[0],
    "combustion_efficiency": _as(fields.EXIT, "combustion_efficiency", "combustion_efficiency"),
    "pattern_factor": _as(fields.EXIT, "pattern_factor", "pattern_factor"),
    "wall_peak": Field("wall_peak_K", "wall\npeak", "wall_peak", "K", 1.0, decimals=0),
    "fuel_flow": fields.FUEL_AIR[0],
    "fuel_air_ratio": fields.FUEL_AIR[1],
    "equivalence_ratio": fields.FUEL_AIR[2],
    "blowout_margin": _as(
        fields.OPERABILITY, "blowout_margin_percent", "blowout_margin", label="blow-out\nmargin"
    ),
}


def axis_label(axis: Axis) -> str:
    """Return a short column heading for a key: the row and the entry, or the entry alone."""
    parts = axis.key.split(".")
    if parts[-1].isdigit() and len(parts) > 1:
        parts = parts[:-1]
    entry = parts[-1].replace("_", " ")
    owner = parts[-2] if len(parts) > 2 and parts[-2] != "*" else ""
    return "\n".join(filter(None, (owner, *entry.split(" ", 1))))


def axis_words(axis: Axis) -> str:
    """Return key and unit for running text and plot axes."""
    return f"{axis.key}, {axis.unit}" if axis.unit else axis.key


def axis_field(axis: Axis, number: int) -> Field:
    """Return the column of a varied entry; records hold its values under ``axis0``, ``axis1``."""
    unit = axis.unit.replace("%", "percent").replace("/", "_")
    key = f"{axis.key}_{unit}" if unit else axis.key
    return Field(key, axis_label(axis), f"axis{number}", axis.unit, 1.0)
