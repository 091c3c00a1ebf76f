"""From checked tables to sections: every figure resolved, with where it came from."""

from collections.abc import Callable
from pathlib import Path
from typing import Any, NamedTuple

from feedpoint.assumed import Assumed, Origin
from feedpoint.errors import RunRefused, SweepRefused, quoted
from feedpoint.line.loss_law import LossLaw
from feedpoint.run.cable import CableSection, CableTolerances, Ratings, velocity_factor_of_delay
from feedpoint.run.catalogue import Catalogue, CatalogueEntry, ratings, resolved_loss, stated_terms
from feedpoint.run.forms import CableForm, Form, LumpedForm, TransformerForm, TwoPortForm
from feedpoint.run.sections import LumpedSection, Section, TransformerSection
from feedpoint.run.toml_tables import checked
from feedpoint.run.two_port_file import TwoPortSection
from feedpoint.sweep.reader import read_network
from feedpoint.units import METRES_PER_FOOT, SECONDS_PER_NANOSECOND

_FORMS: dict[str, type[Form]] = {
    "cable": CableForm,
    "two-port": TwoPortForm,
    "lumped": LumpedForm,
    "transformer": TransformerForm,
}
_KEYS_OF_MEASURED = ("open", "short", "load", "load_ohm", "open_capacitance_f", "short_inductance_h")
_KIND_OF_KEY = {key: kind for kind, form in _FORMS.items() for key in form.model_fields if key != "name"}


class BuildContext(NamedTuple):
    """What the building of a section needs beside its table."""

    source: str
    folder: Path
    catalogue: Callable[[], Catalogue]
    origin: Origin = "sheet"

    def refuse(self, message: str, key: str) -> RunRefused:
        """Return the refusal of a key."""
        return RunRefused(message, source=self.source, key=key)

    def said(self, value: Any, place: str) -> Assumed[Any]:
        """Return a value that the table states."""
        return Assumed(value, self.origin, place)


def section_of_table(table: dict[str, Any], place: str, context: BuildContext) -> Section:
    """
    Return the section that a table describes; its keys tell the kind.

    Raises
    ------
    RunRefused
        With file, section and key, for anything that makes no section.
    """
    form_of_kind = _FORMS[_kind(table, place, context)]
    form = checked(form_of_kind, table, context.source, place, _KIND_OF_KEY)
    name = table.get("name", "")
    match form:
        case TwoPortForm():
            return _two_port(form, name or place, place, context)
        case LumpedForm():
            return _lumped(form, name or place, place, context)
        case TransformerForm():
            return TransformerSection(name or place, context.said(form.impedance_ratio, place))
        case CableForm():
            return _cable(form, name or form.cable or place, place, context)
    raise AssertionError(form)


def _kind(table: dict[str, Any], place: str, context: BuildContext) -> str:
    """Kind of section that the keys of a table belong to: a cable where none tells."""
    if measured := next((key for key in table if key in _KEYS_OF_MEASURED), None):
        raise context.refuse(
            f"{quoted(measured)} makes it a measured section, which this version does not read yet; expected a cable, "
            "two_port, lumped or transformer section.",
            place,
        )
    first_keys: dict[str, str] = {}
    for key in table:
        if key in _KIND_OF_KEY:
            first_keys.setdefault(_KIND_OF_KEY[key], key)
    if len(first_keys) > 1:
        (kind, key), (other_kind, other_key) = list(first_keys.items())[:2]
        raise context.refuse(
            f"{quoted(key)} belongs to a {kind} section and {quoted(other_key)} to a {other_kind} section; expected "
            "one kind. Make two sections of it.",
            place,
        )
    return next(iter(first_keys), "cable")


def _two_port(form: TwoPortForm, name: str, place: str, context: BuildContext) -> TwoPortSection:
    path = context.folder / form.two_port
    key = f"{place}, two_port"
    try:
        network = read_network(path)
    except SweepRefused as problem:
        raise RunRefused(f"{key}: {problem}", source=context.source) from None
    if network.reference_ohm.size != 2:
        raise context.refuse(f"{form.two_port} has {network.reference_ohm.size} port(s); expected two.", key)
    file = context.said(str(path), key)
    points = network.points
    return TwoPortSection(name, file, points.frequency_hz, points.values, network.reference_ohm, network.findings)


def _lumped(form: LumpedForm, name: str, place: str, context: BuildContext) -> LumpedSection:
    values = form.model_dump(exclude={"name"}, exclude_none=True)
    connections = list(dict.fromkeys(key.partition("_")[0] for key in values))
    if len(connections) > 1:
        raise context.refuse("both series_ and shunt_ elements; expected one kind. Make two sections of it.", place)
    elements = {key.partition("_")[2]: context.said(value, place) for key, value in values.items()}
    return LumpedSection(name, "series" if connections[0] == "series" else "shunt", **elements)


def _cable(form: CableForm, name: str, place: str, context: BuildContext) -> CableSection:
    entry = context.catalogue().find(form.cable, context.source, f"{place}, cable") if form.cable else None
    length_m = _length_m(form, place, context)
    delay_s = _delay_s(form, length_m, place, context)
    velocity_factor = _velocity_factor(form, entry, length_m, delay_s, place, context)
    tempco = form.delay_tempco_ppm_per_k
    own, known = ratings(form), entry.ratings if entry else Ratings()
    section = CableSection(
        name,
        _figure(form, "z0_ohm", entry, place, context),
        velocity_factor,
        context.said(length_m, place),
        _loss(form, entry, velocity_factor.value, place, context),
        context.said(delay_s, f"{place}, delay_ns") if delay_s is not None else None,
        context.said(tempco, place) if tempco is not None else _catalogue_tempco(entry),
        _tolerances(form, place, context),
        Ratings(own.max_voltage_rms_v or known.max_voltage_rms_v, own.max_power_w or known.max_power_w),
        context.said(entry.name, f"{place}, cable") if entry else None,
    )
    _check_tolerances(section, place, context)
    return section


def _check_tolerances(section: CableSection, place: str, context: BuildContext) -> None:
    """Refuse a tolerance that reaches down to 0, where no line is left."""
    tolerances = section.tolerances
    for key, tolerance, figure in (
        ("length_tolerance_m", tolerances.length_m, section.length_m),
        ("z0_tolerance_ohm", tolerances.z0_ohm, section.z0_ohm),
        ("velocity_factor_tolerance", tolerances.velocity_factor, section.velocity_factor),
        ("delay_tolerance_ns", tolerances.delay_s, section.delay_s),
    ):
        if tolerance and figure is not None and tolerance >= figure.value:
            raise context.refuse("the tolerance is not smaller than the value itself.", f"{place}, {key}")


def _catalogue_tempco(entry: CatalogueEntry | None) -> Assumed[float]:
    if entry is None or entry.delay_tempco_ppm_per_k is None:
        return Assumed(0.0, "default")
    return Assumed(entry.delay_tempco_ppm_per_k, "catalogue", entry.name)


def _one_of(form: CableForm, metres: str, feet: str, place: str, context: BuildContext) -> float | None:
    """Return a length [m] that may be stated in metres or in feet, but not in both."""
    in_metres: float | None = getattr(form, metres)
    in_feet: float | None = getattr(form, feet)
    if in_metres is not None and in_feet is not None:
        raise context.refuse(f"both {metres} and {feet}; expected one of them.", place)
    return in_feet * METRES_PER_FOOT if in_feet is not None else in_metres


def _length_m(form: CableForm, place: str, context: BuildContext) -> float:
    length_m = _one_of(form, "length_m", "length_ft", place, context)
    if length_m is None:
        raise context.refuse("length_m (or length_ft) is missing; a cable section needs its length.", place)
    return length_m


def _delay_s(form: CableForm, length_m: float, place: str, context: BuildContext) -> float | None:
    if form.delay_ns is None:
        return None
    if form.velocity_factor is not None:
        raise context.refuse("both delay_ns and velocity_factor; expected one of them.", place)
    if length_m <= 0:
        raise context.refuse("a delay needs a length above 0; expected length_m above 0.", f"{place}, delay_ns")
    delay_s = form.delay_ns * SECONDS_PER_NANOSECOND
    if (velocity_factor := velocity_factor_of_delay(length_m, delay_s)) > 1:
        raise context.refuse(
            f"{form.delay_ns:g} ns for {length_m:g} m is {velocity_factor:.3g} times the velocity of light; expected "
            "the one-way delay of that length.",
            f"{place}, delay_ns",
        )
    return delay_s


def _velocity_factor(
    form: CableForm,
    entry: CatalogueEntry | None,
    length_m: float,
    delay_s: float | None,
    place: str,
    context: BuildContext,
) -> Assumed[float]:
    if delay_s is not None:
        return context.said(velocity_factor_of_delay(length_m, delay_s), f"{place}, delay_ns")
    return _figure(form, "velocity_factor", entry, place, context)


def _figure(
    form: CableForm, key: str, entry: CatalogueEntry | None, place: str, context: BuildContext
) -> Assumed[float]:
    """Return z0_ohm or velocity_factor: the table's own, else the catalogue's."""
    own = getattr(form, key)
    if own is not None:
        return context.said(own, place)
    if entry is not None:
        return Assumed(getattr(entry, key), "catalogue", entry.name)
    instead = " (or delay_ns)" if key == "velocity_factor" else ""
    raise context.refuse(f"{key}{instead} is missing; expected it, or a cable of the catalogue.", place)


def _loss(
    form: CableForm, entry: CatalogueEntry | None, velocity_factor: float, place: str, context: BuildContext
) -> Assumed[LossLaw]:
    terms = stated_terms(form)
    if entry is not None and terms and not {"conductor_loss", "dielectric_loss"} <= {*terms}:
        # The terms of a fit balance one another: one of them in place of the catalogue's is nobody's cable.
        raise context.refuse(
            f"{terms[0]} alone beside a cable of the catalogue; expected conductor_loss and dielectric_loss, or none.",
            place,
        )
    own = resolved_loss(form, velocity_factor, context.source, place)
    if own is not None:
        return context.said(own, place)
    if entry is not None:
        return Assumed(entry.loss_law(velocity_factor, form.steel_core), "catalogue", entry.name)
    raise context.refuse(
        "loss is missing; expected loss points, or conductor_loss (0 if the line shall have none).", place
    )


def _tolerances(form: CableForm, place: str, context: BuildContext) -> CableTolerances:
    length_tolerance_m = _one_of(form, "length_tolerance_m", "length_tolerance_ft", place, context)
    if form.delay_ns is None and form.delay_tolerance_ns is not None:
        raise context.refuse("a tolerance of a delay that is not stated; expected delay_ns too.", place)
    if form.delay_ns is not None and form.velocity_factor_tolerance is not None:
        raise context.refuse("velocity_factor_tolerance beside delay_ns; expected delay_tolerance_ns.", place)
    delay_tolerance_s = form.delay_tolerance_ns
    if delay_tolerance_s is not None:
        delay_tolerance_s *= SECONDS_PER_NANOSECOND
    return CableTolerances(
        length_tolerance_m,
        form.velocity_factor_tolerance,
        delay_tolerance_s,
        form.loss_tolerance_percent,
        form.z0_tolerance_ohm,
        form.delay_tempco_tolerance_ppm_per_k,
    )
