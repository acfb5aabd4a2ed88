"""What is said of a list beside its values: open items, what was refused, and the notes."""

from __future__ import annotations

from collections.abc import Collection, Iterable, Mapping
from operator import itemgetter

import numpy as np

from checker.intake.assemble import Assembly
from checker.intake.columns import Plan
from checker.intake.converted import Converted, ConvertedNumbers
from checker.intake.decimal_marks import DECIMAL
from checker.intake.layout import Layout
from checker.intake.lines import Lines, named_rows
from checker.intake.number_cells import NumberContext
from checker.intake.records import Form
from checker.intake.texts import shown
from checker.model import Address, HoldItem, UnreadItem

__all__ = ["decimal_sentence", "hold_register", "notes_on_cells", "notes_on_list", "unread_items"]


def hold_register(plan: Plan, converted: Mapping[int, Converted], lines: Lines, file: str) -> tuple[HoldItem, ...]:
    """Return the open items of the originator, in the order of the rows and columns."""
    found = []
    rows = lines.row.tolist()
    for column in plan.columns:
        mine = converted[column.index].holds
        for line, text in zip(mine, lines.columns[column.index].at(mine), strict=True):
            address = Address(file, rows[line], column.header)
            found.append((line, column.index, HoldItem(lines.numbers[line], column.field.name, text.strip(), address)))
    found.sort(key=itemgetter(0, 1))
    return tuple(item for _, _, item in found)


def unread_items(
    plan: Plan, converted: Mapping[int, Converted], lines: Lines, layout: Layout, file: str
) -> list[UnreadItem]:
    """Return the refused headers, rows and cells, each with its sentence."""
    items = [UnreadItem("", header, why, Address(file, layout.header_row, header)) for header, why in plan.unread]
    items.extend(lines.unread)
    for column in plan.columns:
        mine = converted[column.index]
        if isinstance(mine, ConvertedNumbers) and mine.column_is_refused():
            address = Address(file, layout.header_row, column.header)
            items.append(UnreadItem("", column.header, mine.column_refusal, address))
        cells = lines.columns[column.index]
        items.extend(
            UnreadItem(lines.numbers[index], cells[index], reason, Address(file, int(lines.row[index]), column.header))
            for index, reason in mine.reasons.items()
            if index not in lines.broken
        )
    header = layout.headers[next(column.index for column in plan.columns if column.field.name == "line_number")]
    items.extend(
        UnreadItem(lines.numbers[index], lines.numbers[index], reason, Address(file, int(lines.row[index]), header))
        for index, reason in lines.broken.items()
    )
    return sorted(items, key=lambda item: item.address.row)


def decimal_sentence(form: Form, contexts: Collection[NumberContext]) -> str:
    """Return which decimal mark the list is read with; empty for a workbook, which keeps numbers as numbers."""
    commas = sum(context.marks is not None and context.marks.comma == DECIMAL for context in contexts)
    if form.comma or (commas and commas == len(contexts)):
        return "Decimal commas."
    if commas:
        return "Decimal points and decimal commas, by column."
    return "Decimal points." if form.delimiter else ""


def _by_sentence(pairs: Iterable[tuple[str, str]]) -> list[str]:
    """Return sentences on columns, each with all the headers it is said of."""
    headers: dict[str, list[str]] = {}
    for header, sentence in pairs:
        headers.setdefault(sentence, []).append(shown(header))
    return [f"Column{'s' if len(names) > 1 else ''} {', '.join(names)}: {text}" for text, names in headers.items()]


def notes_on_cells(
    plan: Plan, contexts: Mapping[int, NumberContext], converted: Mapping[int, Converted], lines: Lines
) -> list[str]:
    """Return what to say of decimal marks and of footnote marks, column by column."""
    said = []
    for column in plan.columns:
        context, mine = contexts.get(column.index), converted[column.index]
        if context is not None and context.marks is not None and context.marks.note:
            said.append((column.header, context.marks.note))
        if isinstance(mine, ConvertedNumbers) and mine.notes:
            rows = named_rows([int(lines.row[index]) for index in sorted(mine.notes)])
            marks = ", ".join(dict.fromkeys(mine.notes.values()))
            said.append((column.header, f"numbers read without what stands behind them ({marks}): rows {rows}."))
    return _by_sentence(said)


def notes_on_list(layout: Layout, lines: Lines, plan: Plan, assembly: Assembly) -> tuple[str, ...]:
    """Return the sentences on headers, columns, rows and composite cases."""
    notes = [*layout.notes, *plan.notes, *lines.notes]
    if bool(assembly.composite.any()):
        codes = np.unique(assembly.case.codes[assembly.composite])
        names = ", ".join(assembly.case.texts[int(code)] for code in codes)
        notes.append(
            f"Composite cases (their own flow beside pressure, temperature or properties of all cases): {names}."
        )
    return tuple(notes)
