"""The blank line list as a workbook: headers with notes, drop-downs, and a sheet that says how to fill it."""

from __future__ import annotations

import io
from collections.abc import Mapping, Sequence
from datetime import datetime
from typing import Any

from checker.criteria.nominal_size import nominal_sizes
from checker.fields import Field
from checker.pipe.sizes import schedules
from checker.report.field_texts import example_of, header_of, shown_unit_of, spellings_text, units_text

__all__ = ["HELP_SHEET", "LIST_SHEET", "blank_workbook"]

LIST_SHEET, HELP_SHEET, CHOICES_SHEET = "Line list", "How to fill it", "Choices"
ROWS = 2_000
ACCENT, INK, TINT, HAIRLINE, MUTED = "#0c4a54", "#1c262c", "#f1f5f5", "#ccd4d8", "#56636b"
CASES = ("minimum", "normal", "maximum", "relief", "start-up", "shut-down", "blowdown", "steam-out", "regeneration")
_CREATED = datetime(2000, 1, 1)
_WIDTHS = {"line_number": 24, "service": 20, "fluid": 20, "fittings": 34, "remarks": 34, "from": 16, "to": 16}


def blank_workbook(fields: Sequence[Field]) -> bytes:
    """Return the blank list as XLSX; the same fields give the same bytes.

    Parameters
    ----------
    fields : sequence of Field
        Columns of the list, in their order.
    """
    import xlsxwriter

    content = io.BytesIO()
    with xlsxwriter.Workbook(content, {"in_memory": True, "strings_to_formulas": False}) as book:
        book.set_properties({"title": "Line list", "created": _CREATED})
        styles = _styles(book)
        sheets = [book.add_worksheet(name) for name in (LIST_SHEET, HELP_SHEET, CHOICES_SHEET)]
        choices = _choices()
        _write_choices(sheets[2], choices, styles)
        _write_list(sheets[0], fields, choices, styles)
        _write_help(sheets[1], fields, styles)
        sheets[0].activate()
    return content.getvalue()


def _choices() -> dict[str, tuple[str, ...]]:
    """Return the words of each drop-down, by field."""
    return {
        "size": tuple(_nps(size) for size in nominal_sizes()),
        "phase": ("liquid", "gas", "two-phase"),
        "pressure_basis": ("inlet", "outlet"),
        "case": CASES,
        "schedule": schedules(),
    }


def _nps(size: float) -> str:
    """Return a nominal size as the trade writes it: ``1-1/2``."""
    whole, rest = divmod(size, 1.0)
    numerator, denominator = rest.as_integer_ratio()
    fraction = f"{numerator}/{denominator}" if numerator else ""
    return "-".join(text for text in (f"{int(whole)}" if whole else "", fraction) if text)


def _styles(book: Any) -> dict[str, Any]:
    base = {"font_name": "Arial", "font_size": 10, "font_color": INK, "valign": "top"}
    head = {**base, "bold": True, "text_wrap": True, "font_color": "#ffffff", "bg_color": ACCENT}
    return {
        "head": book.add_format({**head, "valign": "vcenter", "border": 1, "border_color": HAIRLINE}),
        "text": book.add_format({**base, "num_format": "@"}),
        "number": book.add_format(base),
        "prose": book.add_format({**base, "text_wrap": True, "bottom": 1, "bottom_color": HAIRLINE}),
        "name": book.add_format({**base, "bold": True, "bottom": 1, "bottom_color": HAIRLINE, "bg_color": TINT}),
        "title": book.add_format({**base, "bold": True, "font_size": 14, "font_color": ACCENT}),
        "note": book.add_format({**base, "text_wrap": True, "font_color": MUTED}),
    }


def _write_choices(sheet: Any, choices: Mapping[str, Sequence[str]], styles: Mapping[str, Any]) -> None:
    for column, (name, words) in enumerate(choices.items()):
        sheet.set_column(column, column, 18, styles["text"])
        sheet.write_string(0, column, f"Choices of {name}", styles["head"])
        for row, word in enumerate(words, start=1):
            sheet.write_string(row, column, word, styles["text"])


def _write_list(
    sheet: Any, fields: Sequence[Field], choices: Mapping[str, Sequence[str]], styles: Mapping[str, Any]
) -> None:
    sheet.freeze_panes(1, 1)
    sheet.set_row(0, 48)
    sheet.set_landscape()
    sheet.set_paper(8)
    sheet.repeat_rows(0)
    for column, field in enumerate(fields):
        style = styles["number" if field.kind == "number" else "text"]
        sheet.set_column(column, column, _WIDTHS.get(field.name, 14), style)
        sheet.write_string(0, column, header_of(field), styles["head"])
        sheet.write_comment(0, column, _note(field), {"author": "", "x_scale": 2.2, "y_scale": 1.6, "color": TINT})
        if field.name in choices:
            sheet.data_validation(1, column, ROWS, column, _drop_down(field.name, choices))


def _drop_down(name: str, choices: Mapping[str, Sequence[str]]) -> dict[str, Any]:
    letter = "ABCDEFGH"[list(choices).index(name)]
    return {
        "validate": "list",
        "source": f"={CHOICES_SHEET}!${letter}$2:${letter}${len(choices[name]) + 1}",
        "error_type": "warning",
        "error_title": "Not one of the choices",
        "error_message": f"See the sheet '{HELP_SHEET}' for what else is understood here.",
    }


def _note(field: Field) -> str:
    parts = [f"{field.meaning[:1].upper()}{field.meaning[1:]}."]
    if field.kind == "number":
        parts.append(f"In {shown_unit_of(field) or 'plain numbers'}, as the header says.")
    parts.append(f"Example: {example_of(field)}")
    return "\n".join(parts)


def _write_help(sheet: Any, fields: Sequence[Field], styles: Mapping[str, Any]) -> None:
    for column, width in enumerate((28, 46, 46, 26, 70)):
        sheet.set_column(column, column, width)
    sheet.write_string(0, 0, "How to fill the line list", styles["title"])
    for row, sentence in enumerate(_SENTENCES, start=1):
        sheet.merge_range(row, 0, row, 4, sentence, styles["note"])
    first = len(_SENTENCES) + 2
    heads = ("Column heading", "What it is", "Units understood, one in the heading", "Example", "Other headings")
    for column, head in enumerate(heads):
        sheet.write_string(first, column, head, styles["head"])
    sheet.freeze_panes(first + 1, 1)
    for row, field in enumerate(fields, start=first + 1):
        sheet.write_string(row, 0, header_of(field), styles["name"])
        texts = (field.meaning, units_text(field), example_of(field), spellings_text(field))
        for column, text in enumerate(texts, start=1):
            sheet.write_string(row, column, text, styles["prose"])


_SENTENCES = (
    "One row a line and case: repeat the line number for each case. A blank cell asks for its value; a column that is "
    "not there does not.",
    "Every number stands in the unit of its heading. Another unit may be written into the heading, or behind the "
    "number; a pressure says gauge or absolute (barg, bara).",
    "Write HOLD, TBC or VTA for an open item, N/A for what does not apply, NNF for a case without flow, ATM for "
    "atmospheric and FV for full vacuum (design only), AMB for the ambient range of the criteria.",
    "Two values (45 to 60) are kept both, and each end is checked; a limit (<5) or an approximation (~50) is listed "
    "but not used.",
    "Sizes are texts, so that 1-1/2 does not become a date. A row that is struck through is a deleted line.",
)
