"""``python -m spinhazard``."""

from spinhazard.cli import main

main()
