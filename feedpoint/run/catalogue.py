"""The catalogue of cables: published points by standard designation, built in or a user's own, in one form."""

import re
from collections.abc import Sequence
from difflib import get_close_matches
from functools import cache
from pathlib import Path
from typing import NamedTuple

from feedpoint.errors import RunRefused, quoted
from feedpoint.line.loss_fit import fit_loss_law
from feedpoint.line.loss_law import LossLaw
from feedpoint.run.cable import Ratings
from feedpoint.run.forms import CatalogueEntryForm, LossKeys
from feedpoint.run.toml_tables import checked, parse_toml, refuse_unknown_keys
from feedpoint.sweep.text import decoded, read_bytes
from feedpoint.units import HZ_PER_MHZ, METRES_PER_FOOT

BUILT_IN = "built-in catalogue"
_LOSS_TERMS = ("conductor_loss", "dielectric_loss", "floor_loss")


class CatalogueEntry(NamedTuple):
    """One cable: the high-frequency figures, the points that a source prints, and those sources."""

    name: str
    z0_ohm: float
    velocity_factor: float
    loss_keys: LossKeys
    ratings: Ratings
    dielectric: str = ""
    capacitance_pf_per_m: float | None = None
    delay_tempco_ppm_per_k: float | None = None
    sources: tuple[str, ...] = ()
    catalogue: str = BUILT_IN
    place: str = ""

    def loss_law(self, velocity_factor: float, steel_core: bool | None = None) -> LossLaw:
        """Return the law at the velocity factor that is in force; with `steel_core` where a sheet says so."""
        keys = self.loss_keys if steel_core is None else self.loss_keys.model_copy(update={"steel_core": steel_core})
        law = resolved_loss(keys, velocity_factor, self.catalogue, self.place)
        assert law is not None
        return law


class Catalogue(NamedTuple):
    """Entries by name; a later one shadows an earlier one of the same name."""

    entries: dict[str, CatalogueEntry]

    def find(self, name: str, source: str, key: str) -> CatalogueEntry:
        """Return the entry of that name, whatever its case, blanks, hyphens and slashes; `RunRefused` if none."""
        entry = self.entries.get(plain_name(name))
        if entry is not None:
            return entry
        near = get_close_matches(plain_name(name), self.entries, n=3)
        names = ", ".join(self.entries[plain].name for plain in near or self.entries)
        raise RunRefused(
            f"unknown cable {quoted(name)}. {'Did you mean' if near else 'Known are'} {names}{'?' if near else '.'} "
            "Another cable is described by z0_ohm, velocity_factor and loss.",
            source=source,
            key=key,
        )

    def extended(self, entries: Sequence[CatalogueEntry]) -> "Catalogue":
        """Return a catalogue with more entries, which shadow those of the same name."""
        return Catalogue({**self.entries, **{plain_name(entry.name): entry for entry in entries}})


def plain_name(name: str) -> str:
    """Return a cable's name without what people write differently: case, blanks, hyphens, slashes."""
    return re.sub(r"[\s/-]", "", name).casefold()


@cache
def built_in_catalogue() -> Catalogue:
    """Return the catalogue that comes with the package."""
    text = Path(__file__).with_name("catalogue.toml").read_text(encoding="utf-8")
    return Catalogue({}).extended(parse_catalogue(text, BUILT_IN))


def read_catalogue(path: Path) -> list[CatalogueEntry]:
    """Read a catalogue file; `RunRefused` names file and line or key."""
    return parse_catalogue(decoded(read_bytes(path, RunRefused), str(path), RunRefused), str(path))


def parse_catalogue(text: str, source: str) -> list[CatalogueEntry]:
    """
    Return the entries of a catalogue text.

    Raises
    ------
    RunRefused
        For bad TOML, unknown keys, figures that cannot be, or two entries of one name.
    """
    tables = parse_toml(text, source)
    refuse_unknown_keys(tables, ("cable",), source, "")
    cables = tables.get("cable")
    if not isinstance(cables, list) or not cables:
        raise RunRefused("no [[cable]] table; expected at least one.", source=source)
    entries = [_entry(table, source, f"cable {number}") for number, table in enumerate(cables, start=1)]
    names = [plain_name(entry.name) for entry in entries]
    for number, name in enumerate(names):
        if name in names[:number]:
            raise RunRefused(
                f"{quoted(entries[number].name)} is the name of cable {names.index(name) + 1} too; expected it once.",
                source=source,
                key=f"cable {number + 1}",
            )
    return entries


def _entry(table: object, source: str, place: str) -> CatalogueEntry:
    form = checked(CatalogueEntryForm, table, source, place)
    place = f"{place} ({form.name})"
    # So that an entry without a usable loss is refused when the catalogue is read; the fit waits until it is used.
    if loss_points(form, source, place) is None and not stated_terms(form):
        raise RunRefused("no loss; expected loss points or conductor_loss.", source=source, key=place)
    return CatalogueEntry(
        form.name,
        form.z0_ohm,
        form.velocity_factor,
        form,
        ratings(form),
        form.dielectric or "",
        form.capacitance_pf_per_m,
        form.delay_tempco_ppm_per_k,
        tuple(form.sources),
        source,
        place,
    )


def ratings(form: LossKeys) -> Ratings:
    """Return the ratings that a section or entry states."""
    power = tuple((point.mhz * HZ_PER_MHZ, point.w) for point in form.max_power_w or ())
    return Ratings(form.max_voltage_rms_v, power)


def resolved_loss(form: LossKeys, velocity_factor: float, source: str, place: str) -> LossLaw | None:
    """
    Return the loss law that a section or entry states, by points or by terms; None where it states none.

    Raises
    ------
    RunRefused
        As `loss_points`.
    """
    points = loss_points(form, source, place)
    if points is not None:
        frequencies = [megahertz * HZ_PER_MHZ for megahertz in points]
        return fit_loss_law(frequencies, list(points.values()), velocity_factor, with_floor=bool(form.steel_core))
    if not stated_terms(form):
        return None
    return LossLaw(form.conductor_loss or 0.0, form.dielectric_loss or 0.0, form.floor_loss or 0.0)


def stated_terms(form: LossKeys) -> list[str]:
    """Return the keys of the loss law's terms that a section or entry states."""
    return [key for key in _LOSS_TERMS if getattr(form, key) is not None]


def loss_points(form: LossKeys, source: str, place: str) -> dict[float, float] | None:
    """
    Return the loss [dB/100 m] at frequencies [MHz] that a section or entry states; None where it states none.

    Raises
    ------
    RunRefused
        For points and terms at once, a point without exactly one loss, or two points at one frequency.
    """
    if form.loss is None:
        return None
    if terms := stated_terms(form):
        raise RunRefused(f"both loss points and {terms[0]}; expected one of them.", source=source, key=place)
    points: dict[float, float] = {}
    for number, point in enumerate(form.loss, start=1):
        key = f"{place}, loss, entry {number}"
        if (point.db_per_100m is None) == (point.db_per_100ft is None):
            raise RunRefused("expected mhz and one of db_per_100m and db_per_100ft.", source=source, key=key)
        if point.mhz in points:
            raise RunRefused(f"a second loss at {point.mhz:g} MHz; expected one.", source=source, key=key)
        points[point.mhz] = point.db_per_100m or (point.db_per_100ft or 0.0) / METRES_PER_FOOT
    return points
