"""Symbols of NZS 3404:Part 1:1997 that tension members and their end connections use.

The symbols follow the standard's notation as remembered; N_ty and N_tu tell apart the two
nominal capacities that clause 7.2 both writes as N_t.
"""

from __future__ import annotations

from tensionlib.calculation.symbols import Notation, Source, Symbol
from tensionlib.quantities import (
    AREA,
    COUNT,
    FACTOR,
    FORCE,
    LENGTH,
    STRESS,
    WELD_STRENGTH,
)

SOURCE = Source(
    "NZS 3404:Part 1:1997 (with amendments; check the edition in force)",
    "NZS 3404",
    "from memory; Tables 3.3(1) and 3.3(2) read in a printed page",
)

_PHI = r"\phi "

NZS = Notation(
    SOURCE,
    [
        Symbol("N_star", "N^{*}", FORCE, "design tension force", "N*"),
        Symbol("N_star_c", "N^{*}_{c}", FORCE, "design action on the connection", "N*_c"),
        Symbol("N_min", r"N_{\min}", FORCE, "minimum design action on the connection"),
        Symbol("phi", r"\phi", FACTOR, "capacity factor", "φ"),
        # Section and material
        Symbol("L", "L", LENGTH, "length of the member"),
        Symbol("A_g", "A_{g}", AREA, "gross area of the cross-section"),
        Symbol("A_d", "A_{d}", AREA, "area deducted for holes"),
        Symbol("A_d1", "A_{d1}", AREA, "deduction along a straight line through one hole"),
        Symbol("A_d2", "A_{d2}", AREA, "deduction along the zigzag through both lines"),
        Symbol("A_n", "A_{n}", AREA, "net area of the cross-section"),
        Symbol("r_min", r"r_{\min}", LENGTH, "least radius of gyration"),
        Symbol("t_y", "t_{y}", LENGTH, "thickness that sets the yield stress"),
        Symbol("t", "t", LENGTH, "thickness, connected element"),
        Symbol("b", "b", LENGTH, "width, connected element"),
        Symbol("d", "d", LENGTH, "depth of the section"),
        Symbol("f_y", "f_{y}", STRESS, "yield stress"),
        Symbol("f_u", "f_{u}", STRESS, "tensile strength"),
        Symbol("k_te", "k_{te}", FACTOR, "correction factor for the distribution of forces"),
        Symbol("N_ty", "N_{ty}", FORCE, "nominal capacity, yielding of the gross section"),
        Symbol("N_tu", "N_{tu}", FORCE, "nominal capacity, fracture of the net section"),
        Symbol("phiN_ty", _PHI + "N_{ty}", FORCE, "design capacity, gross yielding", "φN_ty"),
        Symbol("phiN_tu", _PHI + "N_{tu}", FORCE, "design capacity, net fracture", "φN_tu"),
        Symbol("phiN_t", _PHI + "N_{t}", FORCE, "design capacity of the member", "φN_t"),
        Symbol("lambda_r", r"\lambda_{r}", FACTOR, "slenderness L over least radius", "L/r"),
        Symbol("lambda_max", r"\lambda_{\max}", FACTOR, "advised slenderness", "L/r_max"),
        # Counts
        Symbol("n_e", "n_{e}", COUNT, "connected elements (plies)"),
        Symbol("n_g", "n_{g}", COUNT, "number of gussets"),
        Symbol("n_l", "n_{l}", COUNT, "lines of bolts through an element"),
        Symbol("n_p", "n_{p}", COUNT, "bolts in a line"),
        Symbol("n_s", "n_{s}", COUNT, "slots in the tube's walls"),
        Symbol("n_b", "n_{b}", COUNT, "bolts in the connection"),
        Symbol("n_n", "n_{n}", COUNT, "shear planes through the threads"),
        Symbol("n_x", "n_{x}", COUNT, "shear planes clear of the threads"),
        # Bolts and holes
        Symbol("d_f", "d_{f}", LENGTH, "diameter of the bolt"),
        Symbol("c_h", "c_{h}", LENGTH, "clearance of the hole"),
        Symbol("c_s", "c_{s}", LENGTH, "slot width over the gusset's thickness"),
        Symbol("d_h", "d_{h}", LENGTH, "diameter of the hole"),
        Symbol("A_c", "A_{c}", AREA, "core area of the bolt"),
        Symbol("A_o", "A_{o}", AREA, "shank area of the bolt"),
        Symbol("A_s", "A_{s}", AREA, "tensile stress area of the bolt"),
        Symbol("N_tf", "N_{tf}", FORCE, "nominal tension capacity of a bolt"),
        Symbol("f_uf", "f_{uf}", STRESS, "tensile strength of the bolt"),
        Symbol("s_p", "s_{p}", LENGTH, "pitch"),
        Symbol("s_g", "s_{g}", LENGTH, "spacing of the lines across the force"),
        Symbol("s_2", "s_{2}", LENGTH, "set-back of the second line (stagger)"),
        Symbol("s_3", "s_{3}", LENGTH, "stagger seen from the next bolt of the first line"),
        Symbol("s", "s", LENGTH, "stagger of the zigzag step"),
        Symbol("s_d", "s_{d}", LENGTH, "distance between bolts of the two lines"),
        Symbol("g", "g", LENGTH, "gauge from the heel to the first line"),
        Symbol("L_j", "L_{j}", LENGTH, "length of the joint"),
        Symbol("k_r", "k_{r}", FACTOR, "reduction factor for a long joint"),
        Symbol("V_f", "V_{f}", FORCE, "nominal shear capacity of a bolt"),
        Symbol("phiV_f", _PHI + "V_{f}", FORCE, "design shear capacity of all bolts", "φV_f"),
        Symbol("C_1", "C_{1}", FACTOR, "ply bearing factor"),
        Symbol("e_1", "e_{1}", LENGTH, "end distance of the member"),
        Symbol("e_2", "e_{2}", LENGTH, "edge distance across the force, member"),
        Symbol("a_e1", "a_{e1}", LENGTH, "clear length ahead of the end bolt plus half a bolt"),
        Symbol("a_e2", "a_{e2}", LENGTH, "clear length to the next hole plus half a bolt"),
        Symbol("a_e", "a_{e}", LENGTH, "least a_e of the pattern"),
        Symbol("V_bb", "V_{bb}", FORCE, "nominal capacity of the ply in bearing, a bolt"),
        Symbol("V_bt", "V_{bt}", FORCE, "nominal capacity of the ply in tear-out, a bolt"),
        Symbol("V_b", "V_{b}", FORCE, "nominal capacity of the ply at a bolt"),
        Symbol("phiV_b", _PHI + "V_{b}", FORCE, "design capacity of the member's plies", "φV_b"),
        # Block shear
        Symbol("n_v", "n_{v}", COUNT, "shear planes of the block, each ply"),
        Symbol("L_v", "L_{v}", LENGTH, "length of a shear plane"),
        Symbol("A_gv", "A_{gv}", AREA, "gross shear area of the block"),
        Symbol("A_nv", "A_{nv}", AREA, "net shear area of the block"),
        Symbol("b_t", "b_{t}", LENGTH, "net width of the block in tension"),
        Symbol("A_nt", "A_{nt}", AREA, "net tension area of the block"),
        Symbol("k_bs", "k_{bs}", FACTOR, "factor for the spread of tension on the block"),
        Symbol("N_bs", "N_{bs}", FORCE, "nominal capacity of the block"),
        Symbol("phiN_bs", _PHI + "N_{bs}", FORCE, "design capacity of the block", "φN_bs"),
        Symbol("L_vp", "L_{vp}", LENGTH, "length of a shear plane in the gusset"),
        Symbol("A_gvp", "A_{gvp}", AREA, "gross shear area of the gusset's block"),
        Symbol("A_nvp", "A_{nvp}", AREA, "net shear area of the gusset's block"),
        Symbol("A_ntp", "A_{ntp}", AREA, "net tension area of the gusset's block"),
        Symbol("N_bsp", "N_{bsp}", FORCE, "nominal capacity of the gusset's block"),
        Symbol(
            "phiN_bsp", _PHI + "N_{bsp}", FORCE, "design capacity of the gusset's block", "φN_bsp"
        ),
        # Gusset
        Symbol("t_p", "t_{p}", LENGTH, "thickness of the gusset"),
        Symbol("b_p", "b_{p}", LENGTH, "width of gusset there is"),
        Symbol("b_d", "b_{d}", LENGTH, "width to which the force spreads"),
        Symbol("b_e", "b_{e}", LENGTH, "width of gusset that counts"),
        Symbol("f_yp", "f_{yp}", STRESS, "yield stress of the gusset"),
        Symbol("f_up", "f_{up}", STRESS, "tensile strength of the gusset"),
        Symbol("e_p", "e_{p}", LENGTH, "end distance in the gusset"),
        Symbol("e_s", "e_{s}", LENGTH, "side edge distance in the gusset"),
        Symbol(
            "a_p1", "a_{p1}", LENGTH, "gusset: clear length ahead of the last bolt plus half a bolt"
        ),
        Symbol("a_p2", "a_{p2}", LENGTH, "gusset: clear length to the next hole plus half a bolt"),
        Symbol("a_p", "a_{p}", LENGTH, "gusset: least a_e of the pattern"),
        Symbol("V_pb", "V_{pb}", FORCE, "nominal capacity of the gusset in bearing, a bolt"),
        Symbol("V_pt", "V_{pt}", FORCE, "nominal capacity of the gusset in tear-out, a bolt"),
        Symbol("V_p", "V_{p}", FORCE, "nominal capacity of the gusset at a bolt"),
        Symbol("phiV_p", _PHI + "V_{p}", FORCE, "design capacity of the gusset's plies", "φV_p"),
        Symbol("A_gp", "A_{gp}", AREA, "gross area of the gusset on the width that counts"),
        Symbol("A_np", "A_{np}", AREA, "net area of the gusset on the width that counts"),
        Symbol("N_py", "N_{py}", FORCE, "nominal capacity of the gusset, yielding"),
        Symbol("N_pu", "N_{pu}", FORCE, "nominal capacity of the gusset, fracture"),
        Symbol(
            "phiN_py", _PHI + "N_{py}", FORCE, "design capacity of the gusset, yielding", "φN_py"
        ),
        Symbol(
            "phiN_pu", _PHI + "N_{pu}", FORCE, "design capacity of the gusset, fracture", "φN_pu"
        ),
        # Welds
        Symbol("t_w", "t_{w}", LENGTH, "leg size of the fillet weld"),
        Symbol("t_t", "t_{t}", LENGTH, "design throat of the fillet weld"),
        Symbol("f_uw", "f_{uw}", STRESS, "tensile strength of the weld metal"),
        Symbol("l_1", "l_{1}", LENGTH, "length of the first run along the force"),
        Symbol("l_2", "l_{2}", LENGTH, "length of the second run along the force"),
        Symbol("l_t", "l_{t}", LENGTH, "length of the run across the end"),
        Symbol("l_min", r"l_{\min}", LENGTH, "shorter run along the force"),
        Symbol("l_max", r"l_{\max}", LENGTH, "longer run along the force"),
        Symbol("l_w", "l_{w}", LENGTH, "total length of weld"),
        Symbol("v_w", "v_{w}", WELD_STRENGTH, "nominal capacity of the weld per unit length"),
        Symbol("phiV_w", _PHI + "V_{w}", FORCE, "design capacity of the welds", "φV_w"),
        # Detailing limits
        Symbol("t_thin", r"t_{\mathrm{thin}}", LENGTH, "thinner of the parts joined"),
        Symbol("t_thick", r"t_{\mathrm{thick}}", LENGTH, "thicker of the parts joined"),
        Symbol("s_min", r"s_{\min}", LENGTH, "least distance between bolts"),
        Symbol("s_15", "s_{15}", LENGTH, "15 times the thinner ply"),
        Symbol("s_max", r"s_{\max}", LENGTH, "greatest distance between bolts"),
        Symbol("k_e", "k_{e}", FACTOR, "least edge distance over bolt diameter"),
        Symbol("e_min", r"e_{\min}", LENGTH, "least edge distance"),
        Symbol("k_e2", "k_{e2}", FACTOR, "least edge distance over bolt diameter, side edge"),
        Symbol("e_min2", r"e_{\min,2}", LENGTH, "least edge distance, side edge"),
        Symbol("e_12", "e_{12}", LENGTH, "12 times the ply"),
        Symbol("e_max", r"e_{\max}", LENGTH, "greatest edge distance"),
        Symbol("e_12p", "e_{12p}", LENGTH, "12 times the gusset"),
        Symbol("e_maxp", r"e_{\max,p}", LENGTH, "greatest edge distance, gusset"),
        Symbol("s_lim", r"s_{\lim}", LENGTH, "limit of the clause on spacing"),
        Symbol("e_lim", r"e_{\lim}", LENGTH, "limit of the clause on edge distance"),
        Symbol("t_wmin", r"t_{w,\min}", LENGTH, "least leg size"),
        Symbol("t_wmax", r"t_{w,\max}", LENGTH, "greatest leg size along an edge"),
        Symbol("l_4", "l_{4}", LENGTH, "least length of a fillet weld"),
    ],
)
