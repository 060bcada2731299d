"""A bolted end whose holes are stated one by one: staggered, in several elements, or as drilled."""

from __future__ import annotations

from dataclasses import dataclass
from typing import ClassVar

from tensionlib.errors import InputError
from tensionlib.joints.ends import BOLTED_TO, Bolted, Gusset
from tensionlib.joints.holes import Pattern
from tensionlib.joints.stated import EDGES, THREADS, Length, Stated, choice, in_mm
from tensionlib.quantities import LENGTH, count, quantity
from tensionlib.steel import Section, bolt

SHARES = ("equal", "elastic")
TENSIONS = ("uniform", "non-uniform")


@dataclass(frozen=True)
class Covers(Gusset):
    """Cover plates of a splice, in place of a gusset: one each side of the element, or one alone.

    Parameters
    ----------
    thickness, steel
        Of each plate.
    width : length
        Of each plate, across the force; due.
    number : int
        2 for a plate on both sides, 1 for one alone.
    """

    number: int = 2

    def __post_init__(self) -> None:
        super().__post_init__()
        if self.width is None:
            raise InputError("width: missing; a cover plate needs it, for example '150 mm'")
        object.__setattr__(self, "number", count("number", self.number, at_least=1))
        if self.number > 2:
            raise InputError(f"number: got {self.number}; 1 or 2 cover plates are accepted")


@dataclass(frozen=True)
class BoltedPattern(Stated):
    """A bolted end with any pattern of holes.

    Parameters
    ----------
    to : str
        The element on the gusset: as `Bolted`.
    bolts, threads, edge_kind, packing, slip_factor, k_te, k_te_reason
        As `Bolted`.
    holes : Pattern
        Every hole of the end. A bolt through another element than `to` is taken to a plate like
        the gusset through a lug or a plate of its own, and carries the same force as the others.
    plate : Gusset or Covers
        The cover plates of a splice take the place of the gusset.
    plate_end_distance : length, optional
        Last bolt to the edge of the gusset that lies across the member; the member's own end
        distance unless given.
    plate_edge_distance : length, optional
        Outer bolt to the side edge of the gusset on either side.
    share : str
        "equal": the bolts share the force equally. "elastic": the moment of the member's force
        about the bolts' centroid is shared too, by elastic vectors.
    credit_behind : bool
        Credit a net section with the force that bolts between it and the member's body have
        already taken. Off unless asked for, and printed.
    block_tension : str
        Tension on a tear-out block: "uniform" or "non-uniform".
    """

    to: str
    bolts: str
    threads: str
    holes: Pattern
    plate: Gusset
    plate_end_distance: Length | None = None
    plate_edge_distance: Length | None = None
    edge_kind: str = "sheared"
    packing: Length | None = None
    slip_factor: float = 0.35
    share: str = "equal"
    credit_behind: bool = False
    block_tension: str = "uniform"
    k_te: float | None = None
    k_te_reason: str = ""
    kind: ClassVar[str] = "bolted pattern"

    def __post_init__(self) -> None:
        choice("to", self.to, BOLTED_TO)
        choice("threads", self.threads, THREADS)
        choice("edge_kind", self.edge_kind, EDGES)
        choice("share", self.share, SHARES)
        choice("block_tension", self.block_tension, TENSIONS)
        if not isinstance(self.bolts, str):
            raise InputError(f"bolts: got {self.bolts!r}; name them, for example 'M20 8.8/S'")
        if not isinstance(self.holes, Pattern):
            raise InputError(
                f"holes: got {self.holes!r}; a Pattern is due, for example"
                " Pattern.lines(3, ['55 mm'], '40 mm', '70 mm')"
            )
        if not isinstance(self.plate, Gusset):
            raise InputError(
                f"plate: got {self.plate!r}; a Gusset is due, for example"
                " Gusset('12 mm', 'AS/NZS 3678 250')"
            )
        if not isinstance(self.credit_behind, bool):
            raise InputError(f"credit_behind: got {self.credit_behind!r}; True or False is due")
        self._length("plate_end_distance", example="40 mm")
        self._length("plate_edge_distance", example="50 mm")
        self._shear_planes()
        if not any(hole.bolt and self.at_gusset(hole.element) for hole in self.holes.holes):
            raise InputError(f"holes: no bolt goes through the {self.to}, which is on the gusset")
        if self.to == "both flanges":
            for flange in ("flange 1", "flange 2"):
                if not any(h.bolt and h.element == flange for h in self.holes.holes):
                    raise InputError(f"holes: no bolt goes through {flange}; to='both flanges'")
        if self.credit_behind and self.share == "elastic":
            raise InputError(
                "credit_behind: it counts equal shares; give share='equal', or leave the credit out"
            )
        self._factor()

    def at_gusset(self, element: str) -> bool:
        """Whether an element named by a hole is the one on the gusset.

        A leg of an equal angle may go by two names.
        """
        if self.to == "both flanges":
            return element in ("flange 1", "flange 2")
        return element == "" or _same_leg(element) == _same_leg(self.to)

    def with_holes(self, holes: Pattern) -> BoltedPattern:
        """The same end with another pattern, such as the one that was drilled."""
        changed: BoltedPattern = self.but(holes=holes)
        return changed


def _same_leg(name: str) -> str:
    return {"leg": "long leg", "other leg": "short leg"}.get(name, name)


def as_pattern(end: Bolted, section: Section) -> BoltedPattern:
    """A regular end with its holes as points, to be changed one by one.

    Raises
    ------
    InputError
        For an end on both flanges, whose holes are not of one element.
    """
    if end.to == "both flanges":
        raise InputError(
            "to: the holes of an end on both flanges are stated one by one, as"
            " Pattern.lines(..., element='flange 1') + Pattern.lines(..., element='flange 2')"
        )
    apart = in_mm(end.line_spacing) if end.lines == 2 else 0.0
    if end.gauge is not None:
        first = in_mm(end.gauge)
    else:
        first = (section.leg(end.to) - apart) / 2
    at = [quantity(y, LENGTH) for y in (first, first + apart)[: end.lines]]
    holes = Pattern.lines(
        end.per_line,
        at,
        end.end_distance,
        end.pitch,
        [quantity(0.0, LENGTH), quantity(in_mm(end.stagger), LENGTH)] if end.lines == 2 else (),
    )
    if end.clearance is not None:
        for hole in holes.holes:
            holes = holes.reamed(hole.mark, quantity(_diameter(end), LENGTH))
    return BoltedPattern(
        to=end.to,
        bolts=end.bolts,
        threads=end.threads,
        holes=holes,
        plate=end.plate,
        plate_end_distance=end.plate_end_distance or end.end_distance,
        plate_edge_distance=end.plate_edge_distance,
        edge_kind=end.edge_kind,
        packing=end.packing,
        slip_factor=end.slip_factor,
        k_te=end.k_te,
        k_te_reason=end.k_te_reason,
    )


def _diameter(end: Bolted) -> float:
    return bolt(end.bolts).d_f + in_mm(end.clearance)
