"""Bolts as bought and room for the wrench: facts of the trade, no clause of the standards."""

from __future__ import annotations

from functools import cache

from tensionlib.calculation.inputs import Inputs
from tensionlib.calculation.symbols import Symbol
from tensionlib.calculation.working import Working
from tensionlib.quantities import LENGTH

PRACTICE = "practice"

GRIP = Symbol("l_grip", r"l_{\mathrm{grip}}", LENGTH, "thickness of the plies together")
LENGTH_BOUGHT = Symbol("L_bolt", r"L_{\mathrm{bolt}}", LENGTH, "length of the bolt to buy")
SHANK = Symbol("l_shank", r"l_{\mathrm{shank}}", LENGTH, "full shank under its head")
PLANE = Symbol("z_plane", r"z_{\mathrm{plane}}", LENGTH, "farthest shear plane from under the head")


@cache
def _room(k: int, what: str) -> tuple[Symbol, Symbol]:
    return (
        Symbol(f"c_need{k}", f"c_{{\\mathrm{{need}},{k}}}", LENGTH, f"{what}: needs"),
        Symbol(f"c_has{k}", f"c_{{\\mathrm{{has}},{k}}}", LENGTH, f"{what}: has"),
    )


def fastening(work: Working, end: Inputs) -> None:
    """The bolt to buy, whether its shank reaches where it is counted on, and room to tighten it."""
    with work.part(end.choice("label") + "Bolts as bought"):
        for bought in end.parts["bought"]:
            _bolt(work, bought)
        for room in end.parts["room"]:
            needs, has = _room(int(room.choice("number")), room.choice("what"))
            work.check(
                room.choice("what"),
                room.take(work, "needs", needs),
                room.take(work, "has", has),
                PRACTICE,
                kind="advice",
                note=room.choice("note"),
            )


def _bolt(work: Working, bought: Inputs) -> None:
    if bought.choice("held") == "no":
        work.note(f"No bolt length is given: {bought.word('why')}.", PRACTICE)
        return
    bought.take(work, "l_grip", GRIP)
    bought.take(work, "L_bolt", LENGTH_BOUGHT)
    work.note(f"Bolt to buy: {bought.word('words')}.", PRACTICE)
    shank = bought.take(work, "l_shank", SHANK)
    plane = bought.take(work, "z_plane", PLANE)
    if bought.choice("threads") == "out of shear plane":
        work.check(
            "shank through the shear planes",
            plane,
            shank,
            PRACTICE,
            kind="detailing",
            note="threads are counted out of the shear planes",
        )
    if remark := bought.word("clear"):
        work.note(remark, PRACTICE)
