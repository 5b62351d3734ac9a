"""The worksheet: a PDF that an auditor can retrace line by line. The only room that imports reportlab."""

from spinhazard.worksheet.document import worksheet

__all__ = ["worksheet"]
