"""The walk of AS 4100 and NZS 3404 for tension with bending, and for a tie in service."""

from __future__ import annotations

from tensionlib.calculation.inputs import Inputs
from tensionlib.calculation.sheet import Entry
from tensionlib.calculation.symbols import Symbol
from tensionlib.calculation.working import Working
from tensionlib.standards.common_as_nzs import bending
from tensionlib.standards.common_as_nzs.bending import BENT
from tensionlib.standards.common_as_nzs.rules import Rules

_AXES = {
    "x": ("M_star_x", "M_sx", "Z_ex", "e_x"),
    "y": ("M_star_y", "M_sy", "Z_ey", "e_y"),
}


def bending_checks(
    rules: Rules, work: Working, member: Inputs, force: Entry, phiN_t: Entry, f_y: Entry
) -> None:
    """Tension with the moments of load and offset; nothing where none is stated."""
    if not member.parts["bending"]:
        return
    (bent,) = member.parts["bending"]
    with work.part("Tension with bending"):
        moments = {axis: _moment(work, member, bent, force, axis) for axis in _AXES}
        slender = _slenderness(work, bent, f_y)
        capacities = {axis: _capacity(work, bent, axis, f_y, slender) for axis in _AXES}
        phi = work.fixed(
            "phi", rules.factors.member, rules.factors.clause, note="member in bending"
        )
        total = work.step(
            bending.interaction,
            *(force, phiN_t, moments["x"], phi, capacities["x"], moments["y"], capacities["y"]),
        )
        limit = work.fixed(BENT["U_max"], 1.0, "8.3.4")
        work.check("tension with bending", total, limit, "8.3.4")
        work.assume(
            "the member spans on two supports across its load; lateral buckling in bending is not"
            " checked (8.4.4): tension steadies it"
        )


def _moment(work: Working, member: Inputs, bent: Inputs, force: Entry, axis: str) -> Entry:
    design, _, _, offset = _AXES[axis]
    load: Entry | None = None
    symbol = BENT[design]
    if axis == "x" and bent.has("w_x"):
        names = ("gamma_g", "w_g", "w_x", "L_b")
        load = work.step(bending.moment_of_load, *(_take(work, bent, n) for n in names))
    if axis == "y" and bent.has("w_y"):
        w_y, L_b = _take(work, bent, "w_y"), _take(work, bent, "L_b")
        load = work.step(bending.moment_of_side_load, w_y, L_b)
    at_offset: Entry | None = None
    if bent.has(offset):
        at_offset = work.step(bending.moment_of_offset, force, _take(work, bent, offset))
    if load is None and at_offset is None:
        return work.fixed(symbol, 0.0, "", note="no moment about this axis")
    if load is None or at_offset is None:
        only = at_offset if load is None else load
        assert only is not None
        return work.least(symbol, only, title="design moment")
    return work.step(bending.moments_added, load, at_offset, gives=symbol)


def _take(work: Working, bent: Inputs, name: str) -> Entry:
    return bent.take(work, name, BENT[name])


def _capacity(
    work: Working, bent: Inputs, axis: str, f_y: Entry, slender: tuple[Entry, Entry] | None
) -> Entry:
    _, capacity, effective, _ = _AXES[axis]
    elastic = f"Z_{axis}"
    Z = bent.take(work, effective, BENT[elastic] if slender else BENT[effective])
    if slender:
        Z = work.step(bending.slender_modulus, Z, *slender, gives=BENT[effective])
    return work.step(bending.section_moment, f_y, Z, gives=BENT[capacity])


def _slenderness(work: Working, bent: Inputs, f_y: Entry) -> tuple[Entry, Entry] | None:
    """Limit and slenderness of an outstand that buckles before it yields; None for none."""
    if not bent.has("b_s"):
        return None
    kind = bent.choice("plate")
    formula = bending.round_slenderness if kind == "round" else bending.plate_slenderness
    slenderness = work.step(formula, _take(work, bent, "b_s"), _take(work, bent, "t_o"), f_y)
    limit = work.fixed(
        BENT["lambda_ey"],
        bending.PLATE_LIMITS[kind],
        "Table 5.2",
        note=bending.PLATE_WORDS[kind],
        source="Table 5.2, from memory",
    )
    yes, no = "the elastic modulus holds", "the modulus is reduced"
    if work.holds(bending.yields_first, slenderness, limit, yes=yes, no=no):
        return None
    if kind == "round":
        work.not_covered(
            "tension with bending",
            "a slender round tube's effective modulus is not offered",
            "5.2.5",
        )
    return limit, slenderness


# In service -------------------------------------------------------------------------------


def service_lines(work: Working, member: Inputs) -> None:
    """Stretch and sag under the force in service, and the spacing of a pair's ties."""
    _ties(work, member)
    if not member.has("N_star_ser"):
        for name, allowed in (("stretch", "Delta_Lmax"), ("sag", "Delta_max")):
            if member.has(allowed):
                work.not_covered(
                    name,
                    "a limit is stated and no force in service: give design(..., service='150 kN')",
                    "practice",
                )
        return
    with work.part("In service"):
        N = member.take(work, "N_star_ser")
        E = work.fixed(BENT["E"], bending.YOUNG, "", note="from memory, sure")
        L, A_g = member.take(work, "L"), member.take(work, "A_g")
        stretch = work.step(bending.stretch, N, L, E, A_g)
        _limit(work, member, "stretch", stretch, "Delta_Lmax")
        if not member.parts["bending"]:
            return
        (bent,) = member.parts["bending"]
        if not (bent.has("w_g") and bent.has("I_sag")):
            if member.has("Delta_max"):
                work.not_covered(
                    "sag", "a limit is stated and no self-weight is taken to sag by", "practice"
                )
            return
        w_g, L_b, I_sag = (_take(work, bent, n) for n in ("w_g", "L_b", "I_sag"))
        alone = work.step(bending.sag, w_g, L_b, E, I_sag)
        N_E = work.step(bending.straightening, E, I_sag, L_b)
        under = work.step(bending.sag_under_tension, alone, N, N_E)
        _limit(work, member, "sag", under, "Delta_max")


def _limit(work: Working, member: Inputs, name: str, is_now: Entry, allowed: str) -> None:
    if member.has(allowed):
        most = member.take(work, allowed, BENT[allowed])
        work.check(name, is_now, most, "practice", kind="detailing", note="limit as stated")


def _ties(work: Working, member: Inputs) -> None:
    if not member.has("L_s"):
        return
    with work.part("Ties between the components"):
        most = work.step(bending.greatest_tie_spacing, member.take(work, "r_c", BENT["r_c"]))
        symbol: Symbol = BENT["L_s"]
        work.check(
            "spacing of the ties", member.take(work, "L_s", symbol), most, "7.4.3", kind="detailing"
        )
