"""Every bundle of rules comes in by the same door, and nothing fails quietly there."""

from __future__ import annotations

from pathlib import Path

import pytest

from checker.errors import InputError, ToolFaultError
from checker.evaluation import known_fields
from checker.fields import all_fields
from checker.ruling.catalogue import load_rules
from checker.ruling.contract import Source, rule

BUNDLED = (
    "aged-hold", "case-order", "composite-case", "doubled-line-number", "erosional-velocity", "gas-density",
    "gas-velocity", "gauge-absolute", "gauge-absolute-by-velocity", "impossible-value", "liquid-density",
    "liquid-velocity", "look-alike-number", "mach-number", "mass-against-volume-flow", "minimum-velocity",
    "momentum-flux", "nominal-size-basis", "npsh-margin", "number-against-columns", "phase-change", "pressure-budget",
    "pressure-gradient", "pressure-rank", "schedule-exists", "standard-taken-for-actual", "standing-hold",
    "stated-values", "steam-saturation", "steam-velocity", "temperature-rank", "test-pressure-rank",
    "two-phase-velocity", "viscosity-magnitude", "zero-flow-row",
)  # fmt: skip

OWN_RULE = '''
from checker.ruling.contract import Source, rule

@rule(id="{id}", title="Length limit", force="note", sense="at most", source=Source("common practice"),
      calculation="L = {{length}}", unit="m", dimension="length")
def longest({star}{field}, velocity_allowed):
    """Hold the length against a limit."""
    return {field}, velocity_allowed
'''


def own_folder(folder: Path, *, id: str = "own-length", field: str = "length", star: str = "*, ") -> Path:
    (folder / "own.py").write_text(OWN_RULE.format(id=id, field=field, star=star), encoding="utf-8")
    return folder


def test_bundled_rules_are_these_and_sorted() -> None:
    assert tuple(found.id for found in load_rules(known_fields=known_fields())) == BUNDLED


def test_every_bundled_rule_is_complete() -> None:
    for found in load_rules(known_fields=known_fields()):
        assert str(found.source), found.id
        assert found.title, found.id
        assert found.calculation, found.id
        assert found.function.__doc__, found.id
        assert found.origin.startswith("rules."), found.id
        asked = set(found.parameters) | set(found.applies_parameters)
        assert asked <= known_fields(), found.id
        if found.shall_where is not None:
            assert "value" in found.shall_where.__code__.co_varnames


def test_a_folder_of_modules_comes_by_the_same_door(tmp_path: Path) -> None:
    found = load_rules(known_fields=known_fields(), folder=own_folder(tmp_path))
    assert [each.id for each in found] == sorted([*BUNDLED, "own-length"])


def test_an_id_used_twice_names_both_origins(tmp_path: Path) -> None:
    with pytest.raises(ToolFaultError, match=r"rules\.velocity") as caught:
        load_rules(known_fields=known_fields(), folder=own_folder(tmp_path, id="liquid-velocity"))
    assert "linelist_rules_own" in str(caught.value)


def test_an_unknown_field_is_named_with_its_rule(tmp_path: Path) -> None:
    with pytest.raises(ToolFaultError, match=r"own-length.*lenght"):
        load_rules(known_fields=known_fields(), folder=own_folder(tmp_path, field="lenght"))


def test_positional_parameters_are_refused(tmp_path: Path) -> None:
    with pytest.raises(ToolFaultError, match="keyword-only"):
        load_rules(known_fields=known_fields(), folder=own_folder(tmp_path, star=""))


def test_a_module_that_does_not_load_is_a_fault(tmp_path: Path) -> None:
    (tmp_path / "broken.py").write_text("import nothing_of_that_name\n", encoding="utf-8")
    with pytest.raises(ToolFaultError, match=r"broken\.py"):
        load_rules(known_fields=known_fields(), folder=tmp_path)


def test_a_folder_without_modules_or_no_folder_is_refused(tmp_path: Path) -> None:
    with pytest.raises(InputError, match="no Python module"):
        load_rules(known_fields=known_fields(), folder=tmp_path)
    with pytest.raises(InputError, match="not a folder"):
        load_rules(known_fields=known_fields(), folder=tmp_path / "nowhere")


def test_a_rule_without_source_or_with_another_force_is_refused() -> None:
    with pytest.raises(ToolFaultError, match="no source"):
        rule(id="x", title="X", force="should", sense="at most", source=Source(" "), calculation="")(lambda: None)
    with pytest.raises(ToolFaultError, match="must"):
        rule(id="x", title="X", force="must", sense="at most", source=Source("s"), calculation="")(lambda: None)  # type: ignore[arg-type]


def test_field_table_is_sound() -> None:
    fields = all_fields()
    names = [field.name for field in fields]
    assert len(names) == len(set(names))
    for field in fields:
        assert field.kind in ("text", "number", "size"), field.name
        assert bool(field.dimension) == (field.kind != "text"), field.name
        assert field.above < field.below, field.name
        assert field.meaning, field.name
