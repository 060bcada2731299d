"""Limits on pitch, edges and welds, AS 4100:1998 and NZS 3404:1997 9.6 and 9.7.3, from memory.

Shapes: floats or arrays (n,); units N, mm, MPa.
"""

from __future__ import annotations

from typing import Any

from tensionlib.calculation.dispatch import sqrt, square
from tensionlib.calculation.formula import formula
from tensionlib.standards.common_as_nzs.symbols import COMMON

PITCH_LIMIT = 200.0  # mm, 9.6.3
EDGE_LIMIT = 150.0  # mm, 9.6.4
ADVISED_SLENDERNESS = 300.0  # common practice, no source

# Table 9.6.2, from memory, sure: least edge distance over bolt diameter, by how the edge is cut.
EDGE_FACTORS = {"sheared": 1.75, "machine cut": 1.50, "rolled": 1.25}
EDGE_WORDS = {
    "sheared": "sheared or hand flame cut edge",
    "machine cut": "machine flame cut, sawn or planed edge",
    "rolled": "rolled edge of a section",
}


@formula("s_min", COMMON, title="least distance between bolts", clause="9.6.1")
def least_pitch(d_f: Any) -> Any:
    """Least distance between centres of bolts [length]. 9.6.1."""
    return 2.5 * d_f


@formula("s_d", COMMON, title="distance between bolts of the two lines", clause="9.6.1")
def diagonal(s: Any, s_g: Any) -> Any:
    """Centre to centre of staggered bolts [length]. 9.6.1."""
    return sqrt(square(s) + square(s_g))


@formula("s_15", COMMON, title="15 times the thinner ply", clause="9.6.3")
def fifteen_plies(t_thin: Any) -> Any:
    """The greatest pitch by the thinner ply [length]. 9.6.3."""
    return 15 * t_thin


@formula("e_min", COMMON, title="least edge distance", clause="Table 9.6.2")
def least_edge(k_e: Any, d_f: Any) -> Any:
    """Least distance from the centre of a hole to an edge [length]. Table 9.6.2."""
    return k_e * d_f


@formula("e_12", COMMON, title="12 times the ply", clause="9.6.4")
def twelve_plies(t: Any) -> Any:
    """The greatest edge distance by the ply [length]. 9.6.4."""
    return 12 * t


@formula("e_2", COMMON, title="edge distance across the force", clause="")
def edge_from_heel(b: Any, g: Any) -> Any:
    """Line to the toe edge of a leg or flange, one line [length]."""
    return b - g


@formula("e_2", COMMON, title="edge distance across the force", clause="")
def edge_from_heel_two(b: Any, g: Any, s_g: Any) -> Any:
    """Outer line to the toe edge of a leg, two lines [length]."""
    return b - g - s_g


@formula("e_2", COMMON, title="edge distance across the force", clause="")
def edge_middle(b: Any) -> Any:
    """Line in the middle of the element to its edge [length]."""
    return b / 2


@formula("e_2", COMMON, title="edge distance across the force", clause="")
def edge_middle_two(b: Any, s_g: Any) -> Any:
    """Outer of two lines about the middle of the element to its edge [length]."""
    return (b - s_g) / 2
