"""Every hostile workbook ends by itself within 2 GB and 30 s, read or refused in plain sentences, and no more."""

from __future__ import annotations

import re
import sys

import pytest
from test_hostile_families import check, reports
from text_families import Family
from workbook_families import groups

GROUPS = groups()
CASES = [pytest.param(group, family, id=family.name) for group, families in GROUPS.items() for family in families]
CHILD_FORMATS = (".ods", ".xls")
STARTS_READER = re.compile(rf"subprocess\.Popen {re.escape(repr(sys.executable))}$|open \d+$")
"""The process that reads XLS and ODS is started, and written to through a pipe."""


@pytest.mark.parametrize(("group", "family"), CASES)
def test_family(group: str, family: Family) -> None:
    report = dict(reports(group)[family.name])
    touched = report["touched"]
    assert isinstance(touched, list)
    if family.file.endswith(CHILD_FORMATS):
        report["touched"] = [seen for seen in touched if not STARTS_READER.match(seen)]
    check(family, report)


def test_the_families_are_the_same_each_time() -> None:
    for group, families in groups().items():
        assert [family.build() for family in families] == [family.build() for family in GROUPS[group]]
    names = [family.name for families in GROUPS.values() for family in families]
    assert len(names) == len(set(names))
