"""Run sheets and Touchstone files, written from the oracle's descriptions for the package to read."""

from mpmath import nstr

from tests.oracle.described import Cable, Series, Shunt, Transformer, TwoPort
from tests.oracle.telegrapher import mp

DIGITS = 17  # decimal digits in a file: a double is fixed by 17


def written(number):
    """A number as it stands in a file: 17 significant digits."""
    return nstr(mp.mpf(number), DIGITS, min_fixed=0, max_fixed=0)


def as_read(value):
    """The exact complex number that the file's digits say."""
    return mp.mpc(written(mp.re(value)), written(mp.im(value)))


def write_sweep(path, frequency_hz, gamma, reference_ohm):
    """A one-port Touchstone file, real and imaginary part of the reflection, frequencies in Hz to the last bit."""
    lines = [f"# HZ S RI R {reference_ohm!r}"]
    for f, g in zip(frequency_hz, gamma, strict=True):
        lines.append(f"{f!r} {written(mp.re(g))} {written(mp.im(g))}")
    path.write_text("\n".join(lines) + "\n", encoding="ascii")
    return path


def write_two_port(path, section):
    """A two-port Touchstone file; its records stand in the order S11 S21 S12 S22."""
    lines = [f"# HZ S RI R {section.reference_ohm!r}"]
    for f, ((s11, s12), (s21, s22)) in section.s_at.items():
        lines.append(" ".join([repr(f), *(f"{s.real!r} {s.imag!r}" for s in map(complex, (s11, s21, s12, s22)))]))
    path.write_text("\n".join(lines) + "\n", encoding="ascii")
    return path


def keys_of(section, number, folder):
    """Key and value of one section of a run sheet, as TOML text."""
    if isinstance(section, Cable):
        keys = {name: value for name, value in vars(section).items() if value is not None}
        return {name: repr(value) for name, value in keys.items()}
    if isinstance(section, Transformer):
        return {"impedance_ratio": repr(section.impedance_ratio)}
    if isinstance(section, TwoPort):
        name = f"two_port_{number}.s2p"
        write_two_port(folder / name, section)
        return {"two_port": f'"{name}"'}
    place = {Series: "series", Shunt: "shunt"}[type(section)]
    return {f"{place}_{name}": repr(value) for name, value in vars(section).items() if value is not None}


def write_run_sheet(folder, sections, temperature_c):
    """A run sheet and the two-port files that it names; the path of the sheet."""
    lines = ["[run]", 'name = "drawn"', f"temperature_c = {temperature_c!r}"]
    for number, section in enumerate(sections, start=1):
        lines += ["", "[[section]]", f'name = "section {number}"']
        lines += [f"{key} = {value}" for key, value in keys_of(section, number, folder).items()]
    path = folder / "run.toml"
    path.write_text("\n".join(lines) + "\n", encoding="utf-8")
    return path
