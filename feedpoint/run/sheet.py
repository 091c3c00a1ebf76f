"""Run sheets: the TOML file that describes a run."""

from collections.abc import Callable, Sequence
from pathlib import Path
from typing import Any

from feedpoint.assumed import Assumed
from feedpoint.errors import RunRefused
from feedpoint.run.build import BuildContext, section_of_table
from feedpoint.run.catalogue import Catalogue, built_in_catalogue, read_catalogue
from feedpoint.run.forms import AnalyzerForm, BandForm, RunForm
from feedpoint.run.record import AnalyzerErrors, Band, Run
from feedpoint.run.sections import Section
from feedpoint.run.toml_tables import Table, checked, parse_toml, refuse_unknown_keys
from feedpoint.run.two_port_file import TwoPortSection
from feedpoint.sweep.text import decoded, read_bytes

_TABLES = ("run", "section", "band", "analyzer")


def read_run_sheet(path: str | Path, *, cables_file: str | Path | None = None) -> Run:
    """
    Read a run sheet; paths in it are relative to it.

    Parameters
    ----------
    path : str or Path
    cables_file : str or Path, optional
        A catalogue of more cables, in place of the one that the sheet names.

    Raises
    ------
    RunRefused
        Names the file and the line or key.
    """
    path = Path(path)
    text = decoded(read_bytes(path, RunRefused), str(path), RunRefused)
    return parse_run_sheet(text, source=str(path), folder=path.parent, cables_file=cables_file)


def parse_run_sheet(
    text: str, *, source: str = "run sheet", folder: Path | None = None, cables_file: str | Path | None = None
) -> Run:
    """Return the run that the text of a run sheet describes; `folder` is what its paths are relative to."""
    tables = parse_toml(text, source)
    refuse_unknown_keys(tables, _TABLES, source, "")
    folder = folder or Path()
    head = checked(RunForm, tables["run"], source, "[run]") if "run" in tables else RunForm()
    named = Path(cables_file) if cables_file is not None else (folder / head.cables_file if head.cables_file else None)
    context = BuildContext(source, folder, _catalogue_when_needed(named))
    sections = tuple(
        section_of_table(table, f"section {number}", context)
        for number, table in enumerate(_list_of_tables(tables, "section", source), start=1)
    )
    if not sections:
        raise RunRefused("no [[section]]; expected at least one, the first at the shack end.", source=source)
    run = Run(
        sections,
        head.name or Path(source).stem,
        temperature_tolerance_c=head.temperature_tolerance_c,
        analyzer=analyzer_errors(tables["analyzer"], source) if "analyzer" in tables else AnalyzerErrors(),
        bands=_bands(tables, source),
        source=source,
        files=_files(sections, source, named),
    )
    if head.temperature_c is None:
        return run
    return run.at_temperature(Assumed(head.temperature_c, "sheet", "[run], temperature_c"))


def read_analyzer(path: str | Path) -> AnalyzerErrors:
    """Read a file that holds an `[analyzer]` table of its own; `RunRefused` names file and key."""
    source = str(path)
    tables = parse_toml(decoded(read_bytes(Path(path), RunRefused), source, RunRefused), source)
    refuse_unknown_keys(tables, ("analyzer",), source, "")
    if "analyzer" not in tables:
        raise RunRefused("no [analyzer] table; expected one.", source=source)
    return analyzer_errors(tables["analyzer"], source)


def _files(sections: Sequence[Section], source: str, catalogue: Path | None) -> tuple[str, ...]:
    two_ports = [section.file.value for section in sections if isinstance(section, TwoPortSection)]
    return (source, *two_ports, *([str(catalogue)] if catalogue is not None else []))


def run_of_section(table: dict[str, Any], *, cables_file: str | Path | None = None) -> Run:
    """
    Return the run of one section that is described by options instead of a sheet; the keys are the sheet's.

    Raises
    ------
    RunRefused
        Names the key.
    """
    named = Path(cables_file) if cables_file is not None else None
    context = BuildContext("", Path(), _catalogue_when_needed(named), "option")
    section = section_of_table({"name": table.get("cable", "cable"), **table}, "options", context)
    return Run((section,), "the run given by options", source="options")


def _catalogue_when_needed(path: Path | None) -> Callable[[], Catalogue]:
    """Return what gives the built-in catalogue, extended by that of a file; the file is read (and refused) at once."""
    own = read_catalogue(path) if path is not None else []
    return lambda: built_in_catalogue().extended(own)


def analyzer_errors(table: object, source: str) -> AnalyzerErrors:
    """Return the residual errors that an `[analyzer]` table states."""
    form = checked(AnalyzerForm, table, source, "[analyzer]")
    return AnalyzerErrors(**form.model_dump())


def _list_of_tables(tables: Table, key: str, source: str) -> list[dict[str, Any]]:
    found = tables.get(key, [])
    if not isinstance(found, list) or not all(isinstance(table, dict) for table in found):
        raise RunRefused(f"expected [[{key}]] in double brackets, once for each {key}.", source=source, key=key)
    return found


def _bands(tables: Table, source: str) -> tuple[Band, ...]:
    bands = []
    for number, table in enumerate(_list_of_tables(tables, "band", source), start=1):
        form = checked(BandForm, table, source, f"band {number}")
        if form.low_hz >= form.high_hz:
            raise RunRefused(
                f"low_hz is {form.low_hz:g} and high_hz {form.high_hz:g}; expected the lower one first.",
                source=source,
                key=f"band {number} ({form.name})",
            )
        bands.append(Band(form.name, form.low_hz, form.high_hz, form.swr_limit))
    return tuple(bands)
