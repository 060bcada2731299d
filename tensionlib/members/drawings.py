"""Drawings of a member's parts as DXF files, for the fabricator."""

from __future__ import annotations

from pathlib import Path

from tensionlib.errors import InputError
from tensionlib.joints.dxf import save_dxf
from tensionlib.joints.ends import Bolted
from tensionlib.joints.pattern_end import BoltedPattern, as_pattern
from tensionlib.members.member import End, Member
from tensionlib.members.part_views import part_views
from tensionlib.members.pattern import PatternGeometry
from tensionlib.standards import standard as find_standard


def drawings(member: Member, folder: str | Path, *, standard: str = "NZS 3404") -> list[Path]:
    """Write the bolted parts of a member's ends as DXF: the section opened flat, each gusset.

    True size in mm, holes at the standard's size. Gives the files' paths, named by the member's
    mark. Needs ezdxf, which comes with the package extra.

    Raises
    ------
    InputError
        For a member without a bolted end, or a folder that is not there.
    """
    chosen = find_standard(standard)
    views = []
    for end in member.ends:
        laid_out = _as_pattern(member, end)
        if laid_out is not None:
            views += part_views(PatternGeometry(member.profile, member.material, laid_out, chosen))
    if not views:
        raise InputError(f"member: {member.mark} has no bolted end, whose parts could be drawn")
    stem = "".join(c if c.isalnum() or c in "-_" else "_" for c in member.mark)
    return save_dxf(views, folder, stem)


def _as_pattern(member: Member, end: End) -> BoltedPattern | None:
    if isinstance(end, Bolted) and end.to != "both flanges":
        return as_pattern(end, member.profile)
    return end if isinstance(end, BoltedPattern) else None
