"""tensionlib: design of steel tension members and their end connections.

Importing it is light; names are loaded on first use::

    import tensionlib as tl
    from tensionlib.units import kN, mm, m
"""

from __future__ import annotations

from importlib import import_module
from typing import TYPE_CHECKING, Any

from tensionlib.version import __version__

if TYPE_CHECKING:
    from tensionlib.calculation.formula import Constant as Constant
    from tensionlib.calculation.formula import condition as condition
    from tensionlib.calculation.formula import formula as formula
    from tensionlib.calculation.result import Calculation as Calculation
    from tensionlib.calculation.result import Check as Check
    from tensionlib.calculation.symbols import Notation as Notation
    from tensionlib.calculation.symbols import Source as Source
    from tensionlib.calculation.symbols import Symbol as Symbol
    from tensionlib.calculation.symbols import project_notation as project_notation
    from tensionlib.calculation.working import Working as Working
    from tensionlib.joints.ends import Bolted as Bolted
    from tensionlib.joints.ends import Gusset as Gusset
    from tensionlib.joints.ends import Welded as Welded
    from tensionlib.joints.gusset_shape import GussetShape as GussetShape
    from tensionlib.joints.hanger import Hanger as Hanger
    from tensionlib.joints.holes import Hole as Hole
    from tensionlib.joints.holes import Pattern as Pattern
    from tensionlib.joints.pattern_end import BoltedPattern as BoltedPattern
    from tensionlib.joints.pattern_end import Covers as Covers
    from tensionlib.joints.pattern_end import as_pattern as as_pattern
    from tensionlib.joints.pinned import Pinned as Pinned
    from tensionlib.joints.rod import Threaded as Threaded
    from tensionlib.joints.welded_runs import FilletRun as FilletRun
    from tensionlib.joints.welded_runs import WeldedRuns as WeldedRuns
    from tensionlib.joints.welded_runs import balanced_lengths as balanced_lengths
    from tensionlib.members.beside import Across as Across
    from tensionlib.members.beside import Overstrength as Overstrength
    from tensionlib.members.brief import Brief as Brief
    from tensionlib.members.design import design as design
    from tensionlib.members.drawings import drawings as drawings
    from tensionlib.members.member import Member as Member
    from tensionlib.package.issue import issue as issue
    from tensionlib.package.project import check_file as check_file
    from tensionlib.quantities import METRIC as METRIC
    from tensionlib.quantities import US as US
    from tensionlib.quantities import steps as steps
    from tensionlib.quantities import values as values
    from tensionlib.steel import bolt as bolt
    from tensionlib.steel import by_dimensions as by_dimensions
    from tensionlib.steel import double as double
    from tensionlib.steel import find as find
    from tensionlib.steel import grade as grade
    from tensionlib.steel import section as section
    from tensionlib.steel import stated as stated
    from tensionlib.whatif.objectives import Rates as Rates
    from tensionlib.whatif.rules import bolt_sizes as bolt_sizes
    from tensionlib.whatif.rules import clear_of_heel as clear_of_heel
    from tensionlib.whatif.rules import follows as follows
    from tensionlib.whatif.rules import middle_of_leg as middle_of_leg
    from tensionlib.whatif.rules import per_bolt as per_bolt
    from tensionlib.whatif.study import study as study

_WHERE = {
    "Across": "members.beside",
    "Bolted": "joints.ends",
    "BoltedPattern": "joints.pattern_end",
    "Brief": "members.brief",
    "Calculation": "calculation.result",
    "Check": "calculation.result",
    "Constant": "calculation.formula",
    "Covers": "joints.pattern_end",
    "FilletRun": "joints.welded_runs",
    "Gusset": "joints.ends",
    "GussetShape": "joints.gusset_shape",
    "Hanger": "joints.hanger",
    "Hole": "joints.holes",
    "METRIC": "quantities",
    "Member": "members.member",
    "Notation": "calculation.symbols",
    "Overstrength": "members.beside",
    "Pattern": "joints.holes",
    "Pinned": "joints.pinned",
    "Rates": "whatif.objectives",
    "Source": "calculation.symbols",
    "Symbol": "calculation.symbols",
    "Threaded": "joints.rod",
    "US": "quantities",
    "Welded": "joints.ends",
    "WeldedRuns": "joints.welded_runs",
    "Working": "calculation.working",
    "as_pattern": "joints.pattern_end",
    "balanced_lengths": "joints.welded_runs",
    "bolt": "steel",
    "bolt_sizes": "whatif.rules",
    "by_dimensions": "steel",
    "check_file": "package.project",
    "clear_of_heel": "whatif.rules",
    "condition": "calculation.formula",
    "design": "members.design",
    "double": "steel",
    "drawings": "members.drawings",
    "find": "steel",
    "follows": "whatif.rules",
    "formula": "calculation.formula",
    "grade": "steel",
    "issue": "package.issue",
    "middle_of_leg": "whatif.rules",
    "per_bolt": "whatif.rules",
    "project_notation": "calculation.symbols",
    "section": "steel",
    "stated": "steel",
    "steps": "quantities",
    "study": "whatif.study",
    "values": "quantities",
}

__all__ = ["__version__", *sorted(_WHERE)]


def __getattr__(name: str) -> Any:
    if name not in _WHERE:
        raise AttributeError(f"module 'tensionlib' has no attribute {name!r}")
    found = getattr(import_module(f"tensionlib.{_WHERE[name]}"), name)
    globals()[name] = found
    return found


def __dir__() -> list[str]:
    return sorted(__all__)
