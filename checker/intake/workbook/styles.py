"""Styles of a workbook: the number format and the strike of each, and nothing of fills and borders.

They are read here because openpyxl refuses a whole workbook for one fill or colour that it does not know.
"""

from __future__ import annotations

from xml.etree.ElementTree import Element, fromstring

from checker.intake.workbook.number_formats import PLAIN, Style, style_of
from checker.intake.workbook.rich_texts import NAMESPACE, is_struck

__all__ = ["Styles"]


def _named(root: Element, *tags: str) -> list[Element]:
    return root.findall("/".join(NAMESPACE + tag for tag in tags))


class Styles(dict[str | None, Style]):
    """Style by the number that cells carry; cells without one have the first.

    Parameters
    ----------
    xml : bytes
        Styles of the workbook; empty where it has none.
    """

    def __init__(self, xml: bytes) -> None:
        from openpyxl.styles.numbers import BUILTIN_FORMATS

        super().__init__()
        root = fromstring(xml) if xml else Element("none")
        self._codes: dict[int, str] = dict(BUILTIN_FORMATS)
        for known in _named(root, "numFmts", "numFmt"):
            self._codes[int(known.get("numFmtId", "0"))] = known.get("formatCode", "")
        self._struck = [is_struck(font) for font in _named(root, "fonts", "font")] or [False]
        used = _named(root, "cellXfs", "xf")
        self._used = [(int(xf.get("numFmtId", "0")), int(xf.get("fontId", "0"))) for xf in used] or [(0, 0)]

    def __missing__(self, number: str | None) -> Style:
        code, font = self._used[int(number or 0)]
        found = style_of(self._codes.get(code, "General"), struck=self._struck[font])
        style = self[number] = PLAIN if found == PLAIN else found
        return style
