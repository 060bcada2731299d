"""The walk through block shear of a regular pattern: member and gusset."""

from __future__ import annotations

from dataclasses import dataclass

from tensionlib.calculation.formula import Formula
from tensionlib.calculation.inputs import Inputs
from tensionlib.calculation.sheet import Entry
from tensionlib.calculation.working import Working
from tensionlib.standards.common_as_nzs import block
from tensionlib.standards.common_as_nzs.rules import BlockRule


@dataclass(frozen=True)
class Block:
    """A tear-out block: its name, its shear planes a ply, and the width in tension."""

    name: str
    planes: float
    width: Formula
    reads: tuple[str, ...]


TO_EDGE = Block("block shear, line to edge", 1.0, block.width_to_edge, ("e_2", "d_h"))
BOTH_TO_EDGE = Block(
    "block shear, both lines to edge", 1.0, block.width_two_to_edge, ("s_g", "e_2", "d_h")
)
BETWEEN = Block("block shear, between the lines", 2.0, block.width_between, ("s_g", "d_h"))
EACH_EDGE = Block("block shear, each line to its edge", 2.0, block.width_both_edges, ("e_2", "d_h"))


def member_blocks(end: Inputs) -> tuple[Block, ...]:
    """The blocks a regular pattern can tear out of the connected element."""
    two = end.has("s_g")
    if end.choice("side_edge") == "none":
        # A web's lines stand between flanges: no edge to tear to.
        return (BETWEEN,) if two else ()
    if end.choice("lines_from") == "heel":
        return (BOTH_TO_EDGE, BETWEEN) if two else (TO_EDGE,)
    if not two:
        return (TO_EDGE,)
    # Lines either side of a web cannot tear out between themselves.
    return (EACH_EDGE,) if end.choice("to") in ("flange", "both flanges") else (EACH_EDGE, BETWEEN)


def gusset_blocks(end: Inputs) -> tuple[Block, ...]:
    """The blocks of the gusset; to its side edge only where the edge distance is stated."""
    between = (BETWEEN,) if end.has("s_g") else ()
    if not end.has("e_s"):
        return between
    return (*between, BOTH_TO_EDGE) if between else (TO_EDGE,)


@dataclass(frozen=True)
class Ply:
    """The lines a block reads in the part it tears out of, and the symbols it gives there."""

    plies: Entry
    end_distance: Entry
    thickness: Entry
    f_y: Entry
    f_u: Entry
    side: str
    suffix: str


def check_blocks(
    rule: BlockRule,
    work: Working,
    end: Inputs,
    N_c: Entry,
    blocks: tuple[Block, ...],
    ply: Ply,
) -> None:
    """Write a check for each block."""
    if blocks:
        work.note(rule.note, rule.clause)
    for each in blocks:
        _check_block(rule, work, end, N_c, each, ply)


def _check_block(
    rule: BlockRule, work: Working, end: Inputs, N_c: Entry, each: Block, ply: Ply
) -> None:
    clause = rule.clause

    def line(formula: Formula, gives: str, *args: Entry) -> Entry:
        return work.step(formula, *args, gives=gives + ply.suffix, clause=clause)

    t, n_p, d_h = ply.thickness, end.take(work, "n_p"), end.kept_line("d_h")
    L_v = _shear_length(work, end, ply, n_p)
    n_v = work.fixed("n_v", each.planes, clause, note=each.name)
    A_gv = line(block.gross_shear, "A_gv", ply.plies, n_v, L_v, t)
    A_nv = line(block.net_shear, "A_nv", ply.plies, n_v, L_v, n_p, d_h, t)
    reads = [_read(work, end, name, ply) for name in each.reads]
    b_t = work.step(each.width, *reads, clause=clause)
    A_nt = line(block.net_tension, "A_nt", ply.plies, b_t, t)
    k_bs = work.fixed("k_bs", block.UNIFORM, clause, note="tension taken as uniform")
    N_bs = line(block.block_shear, "N_bs", ply.f_u, A_nv, ply.f_y, A_gv, k_bs, A_nt)
    phi = work.fixed("phi", rule.phi, clause, note="block shear", source=rule.known)
    capacity = line(block.design_block, "phiN_bs", phi, N_bs)
    work.check(each.name, N_c, capacity, clause)


def _shear_length(work: Working, end: Inputs, ply: Ply, n_p: Entry) -> Entry:
    if not end.has("s_p"):
        return ply.end_distance
    key = "L_v" + ply.suffix
    known = end.kept(key)
    if known is None:
        known = end.keep(
            key,
            work.step(block.shear_length, ply.end_distance, n_p, end.take(work, "s_p"), gives=key),
        )
    return known


def _read(work: Working, end: Inputs, name: str, ply: Ply) -> Entry:
    if name == "d_h":
        return end.kept_line("d_h")
    if name == "e_2":
        return end.kept_line("e_2") if ply.side == "e_2" else end.take(work, ply.side)
    return end.take(work, name)
