"""design(): from a member, its ends and a force to one calculation."""

from __future__ import annotations

from dataclasses import replace
from typing import cast

from tensionlib.calculation.inputs import Number
from tensionlib.calculation.result import Calculation, Heading
from tensionlib.calculation.sheet import Entry
from tensionlib.calculation.symbols import Notation, Source
from tensionlib.calculation.working import Working
from tensionlib.errors import InputError
from tensionlib.joints.ends import Bolted, Welded
from tensionlib.joints.pattern_end import BoltedPattern
from tensionlib.joints.stated import in_mm
from tensionlib.joints.welded_runs import WeldedRuns
from tensionlib.members.book import Case, Filling, Written, fill
from tensionlib.members.brief import Brief
from tensionlib.members.member import Member
from tensionlib.members.pieces import END_NAMES, Given, gather
from tensionlib.members.resolve import MEMBER_PIECES, whole_end
from tensionlib.members.sketching import sketches
from tensionlib.quantities import (
    FORCE,
    METRIC,
    SUMMARY_FIGURES,
    Quantity,
    View,
    door,
    format_value,
)
from tensionlib.standards import Standard
from tensionlib.standards import standard as find_standard
from tensionlib.steel import bolt, grade, weld_metal
from tensionlib.version import __version__


def design(
    member: Member,
    force: Quantity | str | Entry,
    *,
    standard: str = "NZS 3404",
    service: Quantity | str | None = None,
    view: View = METRIC,
    origin: str = "given",
) -> Calculation:
    """Design a tension member and its end connections to a standard.

    Parameters
    ----------
    member : Member
    force : quantity, text with a unit, or an entry
        The design tension force N* for the strength limit state. An entry of a working of your
        own brings that working's lines with it as the first parts of the calculation.
    standard : str
        "NZS 3404", "AS 4100" (the edition of 2020) or "AS 4100:1998".
    service : quantity or text with a unit, optional
        The force in service, which slip of tensioned friction bolts is checked for.
    view : View
        The units it is shown in: METRIC or US.
    origin : str
        Who says the force: "schedule row 3".

    Returns
    -------
    Calculation
        Every check with its clause, the governing one, what was assumed and what was not checked.

    Raises
    ------
    UnitError, InputError, DataNotFoundError
        Naming the argument, what came and what is accepted. Compression is refused.
    """
    if not isinstance(member, Member):
        raise InputError(f"member: got {member!r}; a Member(...) is due")
    if not isinstance(view, View):
        raise InputError(f"view: got {view!r}; give METRIC, US or METRIC.but(length='m')")
    if not isinstance(origin, str):
        raise InputError(f"origin: got {origin!r}; say in words where the force comes from")
    chosen = find_standard(standard)
    served = None
    if service is not None:
        number = door("service", service, FORCE, at_least=0.0, example="150 kN").internal
        served = Number(number, "given")
    case = case_of(member, chosen, served)
    brief = None
    if isinstance(force, Entry):
        work, N_star = _continued(force, chosen.notation)
        chosen.design(work, case.member, case.ends, N_star)
        written = Written(work.sheet(), tuple(work.assumptions), tuple(work.not_checked))
        filling = Filling(written, tuple(work.values), dict(work.origins))
        at = N_star.index
    else:
        number = door("force", force, FORCE, example="285 kN").internal
        _refuse_compression(number)
        brief = Brief(member, force, standard, service, origin, view)
        filling = fill(replace(case, force=Number(number, origin)))
        at = 0
    symbol = filling.written.sheet.lines[at].symbol
    assert symbol is not None
    label = f"{symbol.text} = {format_value(filling.values[at], FORCE, view, SUMMARY_FIGURES)}"
    same = () if len(case.ends) == 2 else ("both ends are connected in the same way",)
    return Calculation(
        sheet=filling.written.sheet,
        values=filling.values,
        heading=Heading(
            mark=member.mark,
            title=member.title,
            subject=f"{member.profile.designation}, {member.material.name}",
            standard=chosen.source,
            standard_key=chosen.key,
            force=at,
        ),
        origins=filling.origins,
        assumptions=filling.written.assumptions + same,
        not_checked=filling.written.not_checked,
        sources=((chosen.source, "member and connection design"), *_materials(member)),
        draw=lambda: sketches(member, chosen, label, _holes(member, chosen)),
        view=view,
        version=__version__,
        brief=brief,
    )


def _continued(force: Entry, notation: Notation) -> tuple[Working, Entry]:
    """The user's working, to be gone on with, and the design force in it."""
    if not isinstance(force.owner, Working):
        raise InputError("force: this entry belongs to no working")
    if force.symbol.role != FORCE:
        raise InputError(
            f"force: got {force.symbol.text}, {force.symbol.role.phrase}; a force is due"
        )
    work = force.owner.fork(notation)
    N_star = work.adopt(force)
    _refuse_compression(work.values[N_star.index])
    return work, N_star


def _refuse_compression(force: float) -> None:
    if force < 0.0:
        raise InputError(
            f"force: got {format_value(force, FORCE)}, compression; this library designs tension,"
            " so give the tension force as a positive value, for example '285 kN' (compression"
            " only enters as the reversal case of a gusset)"
        )


def case_of(member: Member, standard: Standard, service: Number | None) -> Case:
    """What a member puts to a standard, no force stated yet. Raises as `design`."""
    ends = member.ends
    given = Given(
        standard=standard,
        section=member.profile,
        steel=member.material,
        length=cast(Quantity, member.length),
        across=member.across,
        overstrength=member.overstrength,
        ties=cast(Quantity | None, member.ties),
        service=service,
    )
    made = tuple(
        whole_end(replace(given, end=end, label=label, prefix=prefix))
        for end, (label, prefix) in zip(ends, END_NAMES[len(ends)], strict=True)
    )
    return Case(standard, Number(0.0, "given"), gather(MEMBER_PIECES, given), made)


def _holes(member: Member, chosen: Standard) -> tuple[float, ...]:
    """Hole diameter of each end in mm, 0 for a welded one."""
    holes = []
    for end in member.ends:
        hole = 0.0
        if isinstance(end, Bolted | BoltedPattern):
            d_f = bolt(end.bolts).d_f
            hole, _ = chosen.hole_size(d_f, "standard")
            if isinstance(end, Bolted) and end.clearance is not None:
                hole = d_f + in_mm(end.clearance)
        holes.append(hole)
    return tuple(holes)


def _materials(member: Member) -> list[tuple[Source, str]]:
    """Sources of the materials: section, gussets, bolts, weld metal."""
    steel = member.material
    found = [(Source(steel.standard, steel.standard, steel.known), f"section: {steel.name}")]
    for end in member.ends:
        plate = grade(end.plate.steel)
        found.append((Source(plate.standard, plate.standard, plate.known), f"gusset: {plate.name}"))
        if isinstance(end, Bolted | BoltedPattern):
            fastener = bolt(end.bolts)
            found.append(
                (Source(fastener.source, fastener.source, "from memory"), f"bolts: {end.bolts}")
            )
        elif isinstance(end, Welded | WeldedRuns):
            metal = weld_metal(end.metal)
            found.append(
                (Source(metal.source, metal.source, "from memory"), f"welds: {metal.name}")
            )
    return list(dict.fromkeys(found))
