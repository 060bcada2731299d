"""Libraries a study loads on first use, and what to install where one is missing."""

from __future__ import annotations

from importlib import import_module
from typing import Any

from tensionlib.errors import MissingExtraError


def need(module: str) -> Any:
    """A library of the extra "whatif".

    Raises
    ------
    MissingExtraError
        Where it is not installed, saying what to install.
    """
    try:
        return import_module(module)
    except ImportError as error:
        raise MissingExtraError(
            f'{module.partition(".")[0]} is not installed; pip install "tensionlib[whatif]" brings'
            " what studies, plots and solving need"
        ) from error
