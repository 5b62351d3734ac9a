"""The command line: one file per command, thin. Exit codes: 0 nothing for review, 1 something, 2 input, 3 output.

Everything heavy is imported inside the commands, so that ``spinhazard --help`` stays quick.
"""

from __future__ import annotations

import os
import sys


def main() -> None:
    """Run the command line; complaints go to standard error, one line each."""
    from spinhazard.cli.app import app  # noqa: PLC0415
    from spinhazard.errors import SpinhazardError  # noqa: PLC0415

    try:
        app(prog_name="spinhazard")
    except SpinhazardError as error:
        from spinhazard.cli.screen import complain  # noqa: PLC0415

        complain(error)
        raise SystemExit(error.exit_code) from None
    except BrokenPipeError:
        # the reader of a pipe has left (spinhazard … | head); nothing is wrong
        os.dup2(os.open(os.devnull, os.O_WRONLY), sys.stdout.fileno())
        raise SystemExit(1) from None
