"""Sketches of a member's ends."""

from __future__ import annotations

from tensionlib.calculation.result import Sketch
from tensionlib.members.member import Member


def sketches(member: Member, force: str) -> tuple[Sketch, ...]:
    """One sketch for each distinct end; `force` is the label of the force arrow."""
    return ()
