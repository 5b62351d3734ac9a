"""One typographic scale, one grid, tables legible in black and white; fonts embedded."""

from __future__ import annotations

from functools import lru_cache
from importlib import resources
from typing import Any

from reportlab import rl_config
from reportlab.graphics.shapes import STATE_DEFAULTS
from reportlab.lib import colors
from reportlab.lib.enums import TA_RIGHT
from reportlab.lib.styles import ParagraphStyle
from reportlab.lib.units import mm
from reportlab.pdfbase import pdfmetrics
from reportlab.pdfbase.ttfonts import TTFont

PLAIN, BOLD = "DejaVuSansCondensed", "DejaVuSansCondensed-Bold"
SIZE, LEADING = 8.4, 11.0
RULE = colors.HexColor("#444444")
FAINT = colors.HexColor("#BBBBBB")
SHADE = colors.HexColor("#EEEEEE")
MARGIN = 18 * mm


@lru_cache(maxsize=1)
def register_fonts() -> None:
    """Make the shipped fonts known to reportlab, once; and have streams written as bytes, which is quicker and shorter."""
    rl_config.useA85 = 0
    folder = resources.files("spinhazard.worksheet").joinpath("fonts")
    for name in (PLAIN, BOLD):
        with resources.as_file(folder.joinpath(f"{name}.ttf")) as path:
            pdfmetrics.registerFont(TTFont(name, str(path)))
    STATE_DEFAULTS["fontName"] = PLAIN  # else every drawing would name a font that is not embedded
    pdfmetrics.registerFontFamily(PLAIN, normal=PLAIN, bold=BOLD, italic=PLAIN, boldItalic=BOLD)


def _style(name: str, **changes: Any) -> ParagraphStyle:
    base: dict[str, Any] = {"fontName": PLAIN, "fontSize": SIZE, "leading": LEADING, "splitLongWords": 1}
    return ParagraphStyle(name, **{**base, **changes})


BODY = _style("body", spaceAfter=3)
SMALL = _style("small", fontSize=7.2, leading=9.2)
CELL = _style("cell", fontSize=7.6, leading=9.6)
NUMBER = _style("number", fontSize=7.6, leading=9.6, alignment=TA_RIGHT)
HEAD_CELL = _style("head cell", fontName=BOLD, fontSize=7.6, leading=9.6)
HEAD_NUMBER = _style("head number", fontName=BOLD, fontSize=7.6, leading=9.6, alignment=TA_RIGHT)
TITLE = _style("title", fontName=BOLD, fontSize=15, leading=18, spaceAfter=1)
SUBTITLE = _style("subtitle", fontSize=10, leading=13, spaceAfter=4)
SECTION = _style("section", fontName=BOLD, fontSize=11.5, leading=14, spaceBefore=10, spaceAfter=4)
GROUP = _style("group", fontName=BOLD, fontSize=9, leading=11.5, spaceBefore=6, spaceAfter=2)
FIGURE = _style("figure", fontName=BOLD, fontSize=13, leading=15)
LABEL = _style("label", fontSize=7.2, leading=9)

IDENTITY = [
    ("FONTNAME", (0, 0), (-1, -1), PLAIN),
    ("VALIGN", (0, 0), (-1, -1), "TOP"),
    ("LINEABOVE", (0, 0), (-1, 0), 0.8, RULE),
    ("LINEBELOW", (0, 0), (-1, -1), 0.25, FAINT),
    ("LEFTPADDING", (0, 0), (-1, -1), 0),
    ("TOPPADDING", (0, 0), (-1, -1), 1.5),
    ("BOTTOMPADDING", (0, 0), (-1, -1), 1.5),
]
CAUTION_BOX = [
    ("FONTNAME", (0, 0), (-1, -1), PLAIN),
    ("BOX", (0, 0), (-1, -1), 1.0, RULE),
    ("LEFTPADDING", (0, 0), (-1, -1), 6),
    ("TOPPADDING", (0, 0), (-1, -1), 1),
    ("TOPPADDING", (0, 0), (-1, 0), 3),
    ("BOTTOMPADDING", (0, 0), (-1, -1), 1),
    ("BOTTOMPADDING", (0, -1), (-1, -1), 4),
]
FIGURE_BOX = [
    ("FONTNAME", (0, 0), (-1, -1), PLAIN),
    ("BOX", (0, 0), (-1, -1), 0.8, RULE),
    ("INNERGRID", (0, 0), (-1, -1), 0.4, FAINT),
    ("VALIGN", (0, 0), (-1, -1), "TOP"),
    ("LEFTPADDING", (0, 0), (-1, -1), 5),
    ("TOPPADDING", (0, 0), (-1, -1), 4),
    ("BOTTOMPADDING", (0, 0), (-1, -1), 5),
]
